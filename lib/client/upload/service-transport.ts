import { z } from 'zod';
import { ApiError } from '@/lib/client/api-error';
import { readApiError } from '@/lib/client/read-api-error';
import { requestJson } from '@/lib/client/request-json';
import type { UploadTransport } from '@/lib/client/upload/upload-transport';
import { idSchema } from '@/lib/contracts/common';
import { fileSchema } from '@/lib/contracts/file';

const createdSchema = z.looseObject({ id: idSchema, partSizeBytes: z.int().positive() });

/** Uploads into a session over /api/v1. */
export function serviceTransport(sessionId: string): UploadTransport {
  return {
    create: (file) => requestJson(`/sessions/${sessionId}/files`, { body: file, schema: createdSchema }),
    arrivedParts: async (fileId) => (await requestJson(`/files/${fileId}`, { schema: fileSchema })).parts,
    putPart: (fileId, part, onSent, signal) =>
      putOctets(`/api/v1/files/${fileId}/parts/${part.number}`, part, onSent, signal),
    complete: (fileId) => requestJson(`/files/${fileId}/complete`, { method: 'POST' }),
  };
}

/** Sends octets by XMLHttpRequest, which alone tells how many have left. */
function putOctets(
  address: string,
  part: { octets: Blob; sha256: string | null },
  onSent: (bytes: number) => void,
  signal: AbortSignal,
): Promise<void> {
  return new Promise((resolve, reject) => {
    if (signal.aborted) return reject(signal.reason);
    const request = new XMLHttpRequest();
    const stop = () => request.abort();
    const settle = (end: () => void) => {
      signal.removeEventListener('abort', stop);
      end();
    };
    request.open('PUT', address);
    request.setRequestHeader('content-type', 'application/octet-stream');
    request.setRequestHeader('accept', 'application/json, application/problem+json');
    if (part.sha256 !== null)
      request.setRequestHeader('content-digest', `sha-256=:${base64OfHex(part.sha256)}:`);
    request.upload.onprogress = (event) => onSent(Math.min(event.loaded, part.octets.size));
    request.onabort = () => settle(() => reject(signal.reason ?? new DOMException('Stopped', 'AbortError')));
    request.onerror = () => settle(() => reject(connectionLost()));
    request.ontimeout = request.onerror;
    request.onload = () =>
      settle(() => {
        if (request.status >= 200 && request.status < 300) return resolve();
        const headers = new Headers({ 'content-type': 'application/problem+json' });
        const requestId = request.getResponseHeader('x-request-id');
        if (requestId) headers.set('x-request-id', requestId);
        const status = request.status >= 400 ? request.status : 500;
        void readApiError(new Response(request.responseText, { status, headers })).then(reject, reject);
      });
    signal.addEventListener('abort', stop, { once: true });
    request.send(part.octets);
  });
}

function connectionLost(): ApiError {
  return new ApiError({
    status: 0,
    code: 'offline',
    title: 'No answer from the service',
    detail: 'The connection was lost.',
  });
}

function base64OfHex(hex: string): string {
  const bytes = hex.match(/../g) ?? [];
  return btoa(String.fromCharCode(...bytes.map((byte) => Number.parseInt(byte, 16))));
}
