/** The driver class is not part of knex's typed surface; only what MariaClient overrides is described. */
declare module 'knex/lib/dialects/mysql2/index.js' {
  export default class Mysql2Client {
    acquireConnection(): Promise<unknown>;
    _query(connection: unknown, query: unknown): Promise<unknown>;
    _stream(connection: unknown, query: unknown, stream: unknown, options: unknown): Promise<unknown>;
  }
}
