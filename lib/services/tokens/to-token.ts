import type { ApiTokenRow } from '@/db/repositories/api-tokens';
import type { Token } from '@/lib/contracts/lab';

export function toToken(row: ApiTokenRow): Token {
  return {
    id: row.id,
    name: row.name,
    scopes: row.scopes,
    createdAt: row.created_at.toISOString(),
    expiresAt: row.expires_at.toISOString(),
    lastUsedAt: row.last_used_at?.toISOString() ?? null,
    revokedAt: row.revoked_at?.toISOString() ?? null,
  };
}
