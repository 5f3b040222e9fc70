import Mysql2Client from 'knex/lib/dialects/mysql2/index.js';
import { unavailableFrom } from '@/db/unavailable-from';

/**
 * Knex's client with one difference: a database that is away, restarting or full up throws AppError('unavailable'),
 * so that every caller answers 503 without knowing the driver. A class, because a transaction makes its own client
 * from the prototype.
 */
export class MariaClient extends Mysql2Client {
  override acquireConnection(): Promise<unknown> {
    return super.acquireConnection().catch(rethrow);
  }

  override _query(connection: unknown, query: unknown): Promise<unknown> {
    return super._query(connection, query).catch(rethrow);
  }

  override _stream(connection: unknown, query: unknown, stream: unknown, options: unknown): Promise<unknown> {
    return super._stream(connection, query, stream, options).catch(rethrow);
  }
}

function rethrow(error: unknown): never {
  throw unavailableFrom(error) ?? error;
}
