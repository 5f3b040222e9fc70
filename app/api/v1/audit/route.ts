import { auditEntrySchema } from '@/lib/contracts/audit';
import { pageOf, pageQuerySchema } from '@/lib/contracts/common';
import { route } from '@/lib/http/route';
import { listAudit } from '@/lib/services/audit/list-audit';

export const GET = route({
  access: 'lab',
  action: 'audit.read',
  summary: "The lab's audit trail, newest first",
  query: pageQuerySchema,
  returns: pageOf(auditEntrySchema),
  handle: ({ ctx, query }) => listAudit(ctx, query),
});
