import { intakePreviewSchema, previewInputSchema } from '@/lib/contracts/intake-answer';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { previewIntake } from '@/lib/services/intake/preview-intake';

export const POST = route({
  access: 'lab',
  action: 'file.read',
  summary: 'The first trials as a mapping reads them, and every problem; nothing is written',
  params: idParamsSchema,
  body: previewInputSchema,
  returns: intakePreviewSchema,
  handle: ({ ctx, params, body }) => previewIntake(ctx, { sessionId: params.id, ...body }),
});
