import type { Transaction } from '@/db/transaction';
import { appendAuditEntry, lockAuditHead, noLabChain } from '@/db/repositories/audit-entries';
import type { Ctx } from '@/lib/services/context';
import { canonicalJson } from './canonical-json';
import { hashAuditEntry } from './hash-audit-entry';

export interface AuditInput {
  /** `noun.verb`, as in the policy where the policy has it. */
  action: string;
  subjectKind: string;
  subjectId: string;
  /** Facts worth keeping; never a secret, never a file's contents. */
  detail?: Record<string, unknown>;
}

/**
 * Appends one row to the lab's audit chain inside the caller's transaction: it stands if and only if the change
 * stands. The chain's head row stays locked until the transaction ends, so write the audit row last and keep the
 * transaction short.
 */
export async function writeAudit(trx: Transaction, ctx: AuditAuthor, input: AuditInput): Promise<void> {
  const { labId, userId } = ctx.actor;
  const chainId = labId ?? noLabChain;
  const head = await lockAuditHead(trx, chainId);
  // Through canonical JSON and back, so that what is hashed is what the column will give back.
  const detail: unknown = JSON.parse(canonicalJson(input.detail ?? {}));
  const facts = {
    labId,
    actorId: userId,
    action: input.action,
    subjectKind: input.subjectKind,
    subjectId: input.subjectId,
    detail,
    requestId: ctx.requestId,
    createdAt: new Date(),
    previousHash: head.hash,
  };
  await appendAuditEntry(
    trx,
    chainId,
    {
      lab_id: facts.labId,
      actor_id: facts.actorId,
      action: facts.action,
      subject_kind: facts.subjectKind,
      subject_id: facts.subjectId,
      detail,
      request_id: facts.requestId,
      created_at: facts.createdAt,
      previous_hash: facts.previousHash,
      hash: hashAuditEntry(facts),
    },
    head.entryCount + 1,
  );
}

/** A verb's context, or the little that is known before somebody has signed in. */
export type AuditAuthor = Ctx | { actor: { labId: string | null; userId: string | null }; requestId: string };
