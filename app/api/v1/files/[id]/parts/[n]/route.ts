import { filePartParamsSchema, filePartSchema } from '@/lib/contracts/file-part';
import { route } from '@/lib/http/route';
import { readContentDigest } from '@/lib/services/files/read-content-digest';
import { putPart } from '@/lib/services/files/put-part';

export const PUT = route({
  access: 'lab',
  action: 'file.upload',
  summary: 'Send part n (from 1) as octets; a Content-Digest header (sha-256) is checked if it is there',
  params: filePartParamsSchema,
  body: 'stream',
  maxBytes: 64 * 1024 * 1024,
  returns: filePartSchema,
  handle: ({ ctx, params, body, request }) => {
    const length = request.headers.get('content-length');
    return putPart(ctx, {
      fileId: params.id,
      number: params.n,
      body,
      contentLength: length === null ? null : Number(length),
      sha256: readContentDigest(request.headers.get('content-digest')),
    });
  },
});
