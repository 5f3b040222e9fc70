import { pageOf, pageQuerySchema } from '@/lib/contracts/common';
import { createStudySchema, studySchema } from '@/lib/contracts/lab';
import { route } from '@/lib/http/route';
import { createStudy } from '@/lib/services/studies/create-study';
import { listStudies } from '@/lib/services/studies/list-studies';

export const GET = route({
  access: 'lab',
  action: 'study.read',
  summary: "The lab's studies, newest first",
  query: pageQuerySchema,
  returns: pageOf(studySchema),
  handle: ({ ctx, query }) => listStudies(ctx, query),
});

export const POST = route({
  access: 'lab',
  action: 'study.create',
  summary: 'A new study',
  body: createStudySchema,
  returns: studySchema,
  status: 201,
  handle: ({ ctx, body }) => createStudy(ctx, body),
});
