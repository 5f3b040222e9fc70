import { pageOf, pageQuerySchema } from '@/lib/contracts/common';
import { createdTokenSchema, createTokenSchema, tokenSchema } from '@/lib/contracts/lab';
import { route } from '@/lib/http/route';
import { createToken } from '@/lib/services/tokens/create-token';
import { listTokens } from '@/lib/services/tokens/list-tokens';

export const GET = route({
  access: 'lab',
  action: 'token.read',
  summary: 'Your own tokens, newest first',
  query: pageQuerySchema,
  returns: pageOf(tokenSchema),
  handle: ({ ctx, query }) => listTokens(ctx, query),
});

export const POST = route({
  access: 'labOrBasic',
  action: 'token.create',
  summary: 'A new bearer token; it is shown this once',
  body: createTokenSchema,
  returns: createdTokenSchema,
  status: 201,
  secretAnswer: true,
  handle: ({ ctx, body }) => createToken(ctx, body),
});
