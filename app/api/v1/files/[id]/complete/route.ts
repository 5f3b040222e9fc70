import { fileSchema } from '@/lib/contracts/file';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { completeFile } from '@/lib/services/files/complete-file';

export const POST = route({
  access: 'lab',
  action: 'file.upload',
  summary: 'All parts have been sent: check the whole file and read it',
  params: idParamsSchema,
  returns: fileSchema,
  handle: ({ ctx, params }) => completeFile(ctx, { fileId: params.id }),
});
