import { db } from '@/db/connection';
import { listApiTokens } from '@/db/repositories/api-tokens';
import type { Token } from '@/lib/contracts/lab';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import type { PageInput } from '@/lib/services/page-input';
import { pageOfRows } from '@/lib/services/page-of-rows';
import { toToken } from './to-token';

/** The member's own tokens in this lab, newest first; the tokens themselves are never shown again. */
export async function listTokens(
  ctx: Ctx,
  input: PageInput = {},
): Promise<{ items: Token[]; nextCursor: string | null }> {
  authorize(ctx, 'token.read');
  const { labId, userId } = ctx.actor;
  return pageOfRows(input, (beforeId, limit) => listApiTokens(db(), labId, userId, beforeId, limit), toToken);
}
