import { pageOf, pageQuerySchema } from '@/lib/contracts/common';
import { createFileSchema, fileSchema } from '@/lib/contracts/file';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { createFile } from '@/lib/services/files/create-file';
import { listFiles } from '@/lib/services/files/list-files';

export const GET = route({
  access: 'lab',
  action: 'file.read',
  summary: 'A session’s files, newest first',
  params: idParamsSchema,
  query: pageQuerySchema,
  returns: pageOf(fileSchema),
  handle: ({ ctx, params, query }) => listFiles(ctx, { sessionId: params.id, ...query }),
});

export const POST = route({
  access: 'lab',
  action: 'file.upload',
  summary: 'Begin the upload of a file in parts of partSizeBytes',
  params: idParamsSchema,
  body: createFileSchema,
  returns: fileSchema,
  status: 201,
  handle: ({ ctx, params, body }) => createFile(ctx, { sessionId: params.id, ...body }),
});
