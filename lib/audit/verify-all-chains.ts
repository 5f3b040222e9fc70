import { db } from '@/db/connection';
import { listAuditHeads, listChainlessLabs } from '@/db/repositories/audit-entries';
import { verifyAuditChain, type AuditFault } from './verify-audit-chain';

/** Verifies every chain on record, and names labs whose rows have no head at all. */
export async function verifyAllChains(): Promise<
  { chainId: string; entries: number; faults: AuditFault[] }[]
> {
  const reports: { chainId: string; entries: number; faults: AuditFault[] }[] = [];
  for (const { chainId } of await listAuditHeads(db())) reports.push(await verifyAuditChain(chainId));
  for (const chainId of await listChainlessLabs(db()))
    reports.push({
      chainId,
      entries: 0,
      faults: [{ entryId: null, message: 'the chain has rows but no head' }],
    });
  return reports;
}
