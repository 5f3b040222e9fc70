import { z } from 'zod';
import { fileSchema } from '@/lib/contracts/file';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { getFile } from '@/lib/services/files/get-file';
import { removeFile } from '@/lib/services/files/remove-file';

export const GET = route({
  access: 'lab',
  action: 'file.read',
  summary: 'A file: its state, the parts that have arrived, the arrays in it',
  params: idParamsSchema,
  returns: fileSchema,
  handle: ({ ctx, params }) => getFile(ctx, { fileId: params.id }),
});

export const DELETE = route({
  access: 'lab',
  action: 'file.upload',
  summary: 'Remove a file that no intake uses, or give up its upload',
  params: idParamsSchema,
  returns: z.void(),
  status: 204,
  handle: ({ ctx, params }) => removeFile(ctx, { fileId: params.id }),
});
