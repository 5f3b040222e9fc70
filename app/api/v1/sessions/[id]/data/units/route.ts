import { dataQuerySchema, dataTableSchema } from '@/lib/contracts/data-table';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { getDataTable } from '@/lib/services/intake/get-data-table';

export const GET = route({
  access: 'lab',
  action: 'session.read',
  summary: 'The session’s unit table of one data version, with columns derived from the counts',
  params: idParamsSchema,
  query: dataQuerySchema,
  returns: dataTableSchema,
  handle: ({ ctx, params, query }) =>
    getDataTable(ctx, { sessionId: params.id, dataVersion: query.version, table: 'units' }),
});
