import type { UploadSnapshot } from '@/lib/client/upload/file-upload';
import { formatBytes } from '@/lib/format/format-bytes';
import { formatDuration } from '@/lib/format/format-duration';

/** What an upload is doing, in words: where it is, how fast, and the time left as far as it can be told. */
export function uploadWords(snapshot: UploadSnapshot): string {
  switch (snapshot.phase) {
    case 'waiting':
      return 'waits for its turn';
    case 'checking':
      return 'checking what has arrived';
    case 'completing':
      return 'all sent; being put together';
    case 'sent':
      return 'sent';
    case 'paused':
      return `paused; ${formatBytes(snapshot.safeBytes)} are safe`;
    case 'held':
      return `held since ${clock(snapshot.heldSince)}: ${lower(snapshot.message)} ${formatBytes(snapshot.safeBytes)} are safe.`;
    case 'refused':
      return snapshot.message ?? 'refused';
    case 'sending': {
      const part = `part ${Math.min(snapshot.partsDone + 1, snapshot.partsAll)} of ${snapshot.partsAll}`;
      if (snapshot.bytesPerSecond === null || snapshot.secondsLeft === null) return part;
      return `${part}, ${formatBytes(snapshot.bytesPerSecond)}/s, about ${formatDuration(Math.max(1, Math.ceil(snapshot.secondsLeft)))} left`;
    }
  }
}

function lower(message: string | null): string {
  const text = message ?? 'The service is away.';
  return text.charAt(0).toLowerCase() + text.slice(1);
}

/** The wall clock of this browser: only drawn after something happened in it. */
function clock(atMs: number | null): string {
  const date = new Date(atMs ?? Date.now());
  return `${String(date.getHours()).padStart(2, '0')}:${String(date.getMinutes()).padStart(2, '0')}`;
}
