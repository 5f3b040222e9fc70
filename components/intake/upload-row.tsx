'use client';

import { useSyncExternalStore } from 'react';
import { uploadWords } from '@/components/intake/upload-words';
import { Button } from '@/components/ui/button';
import { numbers } from '@/components/ui/numbers';
import { Progress } from '@/components/ui/progress';
import type { FileUpload } from '@/lib/client/upload/file-upload';
import { formatBytes } from '@/lib/format/format-bytes';

/** One file on its way: its size, how much is there, what it is doing, and the one thing that can be done about it. */
export function UploadRow({ upload, onRemove }: { upload: FileUpload; onRemove: () => void }) {
  const snapshot = useSyncExternalStore(
    (listener) => upload.subscribe(listener),
    () => upload.snapshot,
    () => upload.snapshot,
  );
  const { name, size } = upload.file;
  const { phase } = snapshot;
  return (
    <li className="file">
      <b>{name}</b>
      <span className="n num-right">{formatBytes(size)}</span>
      <Progress
        label={name}
        share={size === 0 ? (phase === 'sent' ? 1 : 0) : snapshot.sentBytes / size}
        held={phase === 'held' || phase === 'paused'}
      />
      <span className={phase === 'refused' ? 'w-not file-words' : 'say file-words'} aria-live="polite">
        {numbers(uploadWords(snapshot))}
      </span>
      <span className="file-acts">
        {phase === 'sending' || phase === 'checking' ? (
          <Button kind="link" onClick={() => upload.pause()} aria-label={`Pause ${name}`}>
            Pause
          </Button>
        ) : null}
        {phase === 'held' || phase === 'paused' ? (
          <Button kind="plain" small onClick={() => void upload.start()} aria-label={`Resume ${name}`}>
            Resume
          </Button>
        ) : null}
        {phase === 'held' || phase === 'paused' || phase === 'refused' ? (
          <Button kind="link" onClick={onRemove} aria-label={`Remove ${name}`}>
            Remove
          </Button>
        ) : null}
      </span>
    </li>
  );
}
