import { db } from '@/db/connection';
import { listAuditHeads, listChainlessLabs } from '@/db/repositories/audit-entries';
import { verifyAuditChain, type AuditReport } from './verify-audit-chain';

/** Verifies every chain on record, and names labs whose rows have no head at all. */
export async function verifyAllChains(): Promise<AuditReport[]> {
  const reports: AuditReport[] = [];
  for (const { chainId } of await listAuditHeads(db())) reports.push(await verifyAuditChain(chainId));
  for (const chainId of await listChainlessLabs(db()))
    reports.push({
      chainId,
      entries: 0,
      headHash: null,
      faults: [{ entryId: null, message: 'the chain has rows but no head' }],
    });
  return reports;
}
