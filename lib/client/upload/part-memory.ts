import { z } from 'zod';

/** What this browser remembers of a started upload, so that it goes on after a reload only with the very same octets. */
export interface PartMemory {
  read(fileId: string): Record<number, string>;
  remember(fileId: string, partNumber: number, sha256: string): void;
  forget(fileId: string): void;
}

const memorySchema = z.record(z.string(), z.string());

/** Keeps part hashes in the browser's storage. A full or refused storage only means that parts are sent again. */
export function browserPartMemory(storage: Storage): PartMemory {
  const key = (fileId: string) => `outfold-upload-${fileId}`;
  const read = (fileId: string): Record<number, string> => {
    try {
      const parsed = memorySchema.safeParse(JSON.parse(storage.getItem(key(fileId)) ?? '{}'));
      return parsed.success ? parsed.data : {};
    } catch {
      return {};
    }
  };
  return {
    read,
    remember(fileId, partNumber, sha256) {
      try {
        storage.setItem(key(fileId), JSON.stringify({ ...read(fileId), [partNumber]: sha256 }));
      } catch {
        // storage is full or switched off: the part would be sent again after a reload, nothing is lost
      }
    },
    forget(fileId) {
      try {
        storage.removeItem(key(fileId));
      } catch {
        // as above
      }
    },
  };
}
