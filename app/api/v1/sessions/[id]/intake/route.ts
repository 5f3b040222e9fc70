import { intakeSchema } from '@/lib/contracts/intake';
import { intakeStateSchema } from '@/lib/contracts/intake-answer';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { submitIntake } from '@/lib/services/intake/submit-intake';

export const POST = route({
  access: 'lab',
  action: 'intake.submit',
  summary: 'Read and check the session’s files by a mapping',
  params: idParamsSchema,
  body: intakeSchema,
  returns: intakeStateSchema,
  status: 202,
  handle: ({ ctx, params, body }) => submitIntake(ctx, { sessionId: params.id, ...body }),
});
