import { auditVerificationSchema } from '@/lib/contracts/audit';
import { route } from '@/lib/http/route';
import { verifyAudit } from '@/lib/services/audit/verify-audit';

export const GET = route({
  access: 'lab',
  action: 'audit.read',
  summary: "Work the lab's audit chain out again and say whether it holds",
  returns: auditVerificationSchema,
  handle: ({ ctx }) => verifyAudit(ctx),
});
