import { createHash } from 'node:crypto';
import { canonicalJson } from './canonical-json';

/** What an audit row says; its hash covers all of it and the hash of the row before it in the same lab. */
export interface AuditFacts {
  labId: string | null;
  actorId: string | null;
  action: string;
  subjectKind: string;
  subjectId: string;
  detail: unknown;
  requestId: string | null;
  createdAt: Date;
  previousHash: string | null;
}

/** SHA-256 (hexadecimal) over the canonical JSON of the row's facts. */
export function hashAuditEntry(facts: AuditFacts): string {
  return createHash('sha256').update(canonicalJson(facts)).digest('hex');
}
