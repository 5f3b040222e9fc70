'use client';

import { Button } from '@/components/ui/button';
import { numbers } from '@/components/ui/numbers';
import { Progress } from '@/components/ui/progress';
import type { StoredFile } from '@/lib/contracts/file';
import { formatBytes } from '@/lib/format/format-bytes';

const formatNames: Record<NonNullable<StoredFile['format']>, string> = {
  npy: 'NPY',
  npz: 'NPZ',
  csv: 'CSV',
  mat5: 'MAT 5',
  mat73: 'MAT 7.3',
  hdf5: 'HDF5',
  nwb: 'NWB',
  arrow: 'Arrow',
  parquet: 'Parquet',
  json: 'JSON',
};

function words(file: StoredFile): string {
  if (file.state === 'uploading') return 'begun and not finished. Add the same file again and it goes on.';
  if (file.state === 'reading') return 'sent; being read';
  if (file.state === 'refused') return `refused: ${file.problems[0]?.message ?? 'it could not be read.'}`;
  const checked = file.sha256 ? `, sha256 ${file.sha256.slice(0, 8)}…` : '';
  return `read as ${file.format ? formatNames[file.format] : 'a file'}${checked}`;
}

/** A file that the service has, or has a part of. */
export function StoredFileRow({
  file,
  onRemove,
}: {
  file: StoredFile;
  /** Absent where it may not be removed. */
  onRemove?: () => void;
}) {
  const arrived = Math.min(file.sizeBytes, file.parts.length * file.partSizeBytes);
  const isUploading = file.state === 'uploading';
  return (
    <li className="file">
      <b>{file.name}</b>
      <span className="n num-right">{formatBytes(file.sizeBytes)}</span>
      <Progress
        label={file.name}
        share={isUploading && file.sizeBytes > 0 ? arrived / file.sizeBytes : isUploading ? 0 : 1}
        held={isUploading}
      />
      <span className={file.state === 'refused' ? 'w-not file-words' : 'say file-words'}>
        {numbers(words(file))}
      </span>
      <span className="file-acts">
        {onRemove ? (
          <Button kind="link" onClick={onRemove} aria-label={`Remove ${file.name}`}>
            Remove
          </Button>
        ) : null}
      </span>
    </li>
  );
}
