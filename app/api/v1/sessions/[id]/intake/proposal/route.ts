import { intakeProposalSchema } from '@/lib/contracts/intake';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { proposeIntake } from '@/lib/services/intake/propose-intake';

export const GET = route({
  access: 'lab',
  action: 'file.read',
  summary: 'A mapping of the session’s files as far as they settle it, and questions for the rest',
  params: idParamsSchema,
  returns: intakeProposalSchema,
  handle: ({ ctx, params }) => proposeIntake(ctx, { sessionId: params.id }),
});
