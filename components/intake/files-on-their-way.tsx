'use client';

import { useState } from 'react';
import { StoredFileRow } from '@/components/intake/stored-file-row';
import { UploadRow } from '@/components/intake/upload-row';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import type { FileUpload } from '@/lib/client/upload/file-upload';
import type { StoredFile } from '@/lib/contracts/file';

/** The session's files: those being sent from this page, and those that the service has. */
export function FilesOnTheirWay({
  files,
  uploads,
  mayRemove,
  onDrop,
  onChanged,
}: {
  files: readonly StoredFile[];
  uploads: readonly FileUpload[];
  mayRemove: boolean;
  onDrop: (upload: FileUpload) => void;
  onChanged: () => void;
}) {
  const [refusal, setRefusal] = useState<string | null>(null);
  const remove = async (fileId: string | null) => {
    setRefusal(null);
    try {
      if (fileId) await requestJson(`/files/${fileId}`, { method: 'DELETE' });
    } catch (error) {
      setRefusal(error instanceof Error ? error.message : 'The file could not be removed.');
    }
    onChanged();
  };
  const shown = uploads.filter((upload) => {
    const stored = files.find((file) => file.id === upload.snapshot.fileId);
    return upload.snapshot.phase !== 'sent' || (stored !== undefined && stored.state === 'uploading');
  });
  const sending = new Set(shown.map((upload) => upload.snapshot.fileId));
  const stored = files.filter((file) => !sending.has(file.id));
  if (shown.length + stored.length === 0) return null;
  return (
    <>
      <ol className="files">
        {stored.map((file) => (
          <StoredFileRow
            key={file.id}
            file={file}
            onRemove={mayRemove && file.state !== 'reading' ? () => void remove(file.id) : undefined}
          />
        ))}
        {shown.map((upload, index) => (
          <UploadRow
            key={upload.snapshot.fileId ?? `${index} ${upload.file.name}`}
            upload={upload}
            onRemove={() => {
              onDrop(upload);
              void remove(upload.snapshot.fileId);
            }}
          />
        ))}
      </ol>
      <FormError message={refusal} />
    </>
  );
}
