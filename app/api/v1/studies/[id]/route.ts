import { changeStudySchema, studySchema } from '@/lib/contracts/lab';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { changeStudy } from '@/lib/services/studies/change-study';
import { getStudy } from '@/lib/services/studies/get-study';

export const GET = route({
  access: 'lab',
  action: 'study.read',
  summary: 'One study',
  params: idParamsSchema,
  returns: studySchema,
  handle: ({ ctx, params }) => getStudy(ctx, { studyId: params.id }),
});

export const PATCH = route({
  access: 'lab',
  action: 'study.change',
  summary: "Change a study's name or question",
  params: idParamsSchema,
  body: changeStudySchema,
  requiresVersion: true,
  returns: studySchema,
  handle: ({ ctx, params, body, ifVersion }) =>
    changeStudy(ctx, { studyId: params.id, ifVersion, change: body }),
});
