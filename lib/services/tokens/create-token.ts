import { randomBytes } from 'node:crypto';
import { v7 } from 'uuid';
import { insertApiToken } from '@/db/repositories/api-tokens';
import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { hashToken } from '@/lib/auth/hash-token';
import type { CreatedToken, CreateToken } from '@/lib/contracts/lab';
import { AppError } from '@/lib/errors/app-error';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { tokenFaults } from './token-faults';

/** A new bearer token that acts for the member. Only its hash is kept: the answer is the one time it is shown. */
export async function createToken(ctx: Ctx, input: CreateToken): Promise<CreatedToken> {
  authorize(ctx, 'token.create');
  const { actor } = ctx;
  const faults = tokenFaults(actor, input, Date.now());
  if (faults.length > 0) throw new AppError('invalid-input', `Not valid: ${faults[0].detail}.`, { faults });
  // The prefix lets people and scanners of leaked secrets recognise it.
  const token = `outfold_${randomBytes(32).toString('base64url')}`;
  const id = v7();
  const scopes = [...new Set(input.scopes)];
  const expiresAt = new Date(input.expiresAt);
  await inTransaction(async (trx) => {
    await insertApiToken(trx, {
      id,
      lab_id: actor.labId,
      user_id: actor.userId,
      name: input.name,
      token_hash: hashToken(token),
      scopes,
      expires_at: expiresAt,
    });
    await writeAudit(trx, ctx, {
      action: 'token.create',
      subjectKind: 'token',
      subjectId: id,
      detail: { name: input.name, scopes, expiresAt: expiresAt.toISOString() },
    });
  });
  return { id, token, name: input.name, scopes, expiresAt: expiresAt.toISOString() };
}
