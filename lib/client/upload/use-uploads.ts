'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { FileUpload } from '@/lib/client/upload/file-upload';
import { browserPartMemory } from '@/lib/client/upload/part-memory';
import { serviceTransport } from '@/lib/client/upload/service-transport';
import { Slots } from '@/lib/client/upload/slots';
import type { StoredFile } from '@/lib/contracts/file';

const partsAtOnce = 3;

/**
 * The uploads of a page. `add` starts files side by side (three parts at once over all of them) and goes on with one that
 * was begun earlier under the same name and size. Held uploads go on by themselves when the connection is back.
 * `onSettled` runs whenever one has been opened, sent or has ended.
 */
export function useUploads(
  sessionId: string,
  stored: readonly StoredFile[],
  onSettled: () => void,
): {
  uploads: readonly FileUpload[];
  add: (files: readonly File[]) => void;
  drop: (upload: FileUpload) => void;
} {
  const [uploads, setUploads] = useState<readonly FileUpload[]>([]);
  const slots = useRef<Slots | null>(null);
  const latest = useRef({ stored, onSettled, uploads });
  useEffect(() => {
    latest.current = { stored, onSettled, uploads };
  });

  const add = useCallback(
    (files: readonly File[]) => {
      slots.current ??= new Slots(partsAtOnce);
      const taken = new Set(latest.current.uploads.map((upload) => upload.snapshot.fileId));
      const added = files.map((file) => {
        const begun = latest.current.stored.find(
          (other) =>
            other.state === 'uploading' &&
            other.name === file.name &&
            other.sizeBytes === file.size &&
            !taken.has(other.id),
        );
        if (begun) taken.add(begun.id);
        return new FileUpload({
          file,
          transport: serviceTransport(sessionId),
          memory: browserPartMemory(window.localStorage),
          slots: slots.current ?? new Slots(partsAtOnce),
          begun,
        });
      });
      for (const upload of added) {
        let phase = upload.snapshot.phase;
        upload.subscribe(() => {
          if (upload.snapshot.phase === phase) return;
          phase = upload.snapshot.phase;
          // a new list, so that whatever counts the uploads is drawn again
          setUploads((before) => [...before]);
          latest.current.onSettled();
        });
        void upload.start();
      }
      setUploads((before) => [...before, ...added]);
    },
    [sessionId],
  );

  const drop = useCallback((upload: FileUpload) => {
    upload.cancel();
    setUploads((before) => before.filter((other) => other !== upload));
  }, []);

  useEffect(() => {
    const goOn = () => {
      for (const upload of latest.current.uploads) if (upload.snapshot.phase === 'held') void upload.start();
    };
    window.addEventListener('online', goOn);
    return () => window.removeEventListener('online', goOn);
  }, []);

  useEffect(() => {
    const isSending = () =>
      latest.current.uploads.some(({ snapshot }) =>
        ['checking', 'sending', 'completing'].includes(snapshot.phase),
      );
    const warn = (event: BeforeUnloadEvent) => {
      if (isSending()) event.preventDefault();
    };
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, []);

  return { uploads, add, drop };
}
