import { db } from '@/db/connection';
import { listAuditChain, listAuditHeads } from '@/db/repositories/audit-entries';
import { hashAuditEntry } from './hash-audit-entry';

export interface AuditFault {
  /** The row that shows the fault; null for the chain as a whole. */
  entryId: number | null;
  message: string;
}

export interface AuditReport {
  chainId: string;
  entries: number;
  /** The last row's hash on record; null for an empty chain. */
  headHash: string | null;
  faults: AuditFault[];
}

const batchSize = 1000;

/**
 * Reads a lab's audit chain from its first row and works every hash out again. A row that was changed does not fit
 * its hash, a row that was taken out or put in breaks the link to the next, and a tail that was cut off does not
 * reach the head. Whoever can rewrite all of the database can rewrite the chain too: keep the head's hash elsewhere
 * (in a backup, on paper) to notice that.
 */
export async function verifyAuditChain(chainId: string): Promise<AuditReport> {
  const faults: AuditFault[] = [];
  // The head first: rows that are written meanwhile lie behind it and are not counted.
  const head = (await listAuditHeads(db())).find((item) => item.chainId === chainId);
  const wanted = head?.entryCount ?? 0;
  let entries = 0;
  let previousHash: string | null = null;
  let afterId = 0;
  while (entries < wanted) {
    const rows = await listAuditChain(db(), chainId, afterId, Math.min(batchSize, wanted - entries));
    if (rows.length === 0) break;
    for (const row of rows) {
      entries += 1;
      afterId = row.id;
      if (row.previous_hash !== previousHash)
        faults.push({ entryId: row.id, message: `row ${row.id} does not follow the row before it` });
      const hash = hashAuditEntry({
        labId: row.lab_id,
        actorId: row.actor_id,
        action: row.action,
        subjectKind: row.subject_kind,
        subjectId: row.subject_id,
        detail: row.detail,
        requestId: row.request_id,
        createdAt: row.created_at,
        previousHash: row.previous_hash,
      });
      if (hash !== row.hash) faults.push({ entryId: row.id, message: `row ${row.id} does not fit its hash` });
      previousHash = row.hash;
    }
  }
  if (entries !== wanted || previousHash !== (head?.hash ?? null))
    faults.push({
      entryId: null,
      message: `the chain's end is not the one on record: ${entries} rows found, ${wanted} written`,
    });
  return { chainId, entries, headHash: head?.hash ?? null, faults };
}
