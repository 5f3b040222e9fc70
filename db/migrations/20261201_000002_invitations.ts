import type { Knex } from 'knex';

const id = (t: Knex.CreateTableBuilder, name: string) =>
  t.specificType(name, 'char(36) character set ascii collate ascii_bin');
const instant = (t: Knex.CreateTableBuilder, name: string) => t.specificType(name, 'datetime(3)');
const created = (t: Knex.CreateTableBuilder) =>
  t.specificType('created_at', 'datetime(3) default current_timestamp(3)').notNullable();

export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('invitations', (t) => {
    id(t, 'id').primary();
    id(t, 'lab_id').notNullable().references('labs.id');
    t.string('email', 254).notNullable();
    t.enum('role', ['lead', 'analyst', 'experimenter', 'observer']).notNullable();
    id(t, 'invited_by').notNullable().references('users.id');
    instant(t, 'expires_at').notNullable();
    instant(t, 'accepted_at').nullable();
    instant(t, 'revoked_at').nullable();
    created(t);
    t.index(['lab_id', 'id']);
  });
  await knex.schema.createTable('password_resets', (t) => {
    id(t, 'id').primary();
    id(t, 'user_id').notNullable().references('users.id').onDelete('CASCADE');
    instant(t, 'expires_at').notNullable();
    instant(t, 'used_at').nullable();
    created(t);
    t.index(['user_id', 'id']);
  });
  // What is to be written to whom. The text is made when it is sent: links in it are worth something, rows are not.
  await knex.schema.createTable('mails', (t) => {
    id(t, 'id').primary();
    t.string('kind', 40).notNullable();
    t.string('recipient', 254).notNullable();
    t.json('payload').notNullable();
    t.integer('attempts').notNullable().defaultTo(0);
    instant(t, 'next_at').notNullable();
    instant(t, 'sent_at').nullable();
    instant(t, 'failed_at').nullable();
    created(t);
    t.index(['sent_at', 'failed_at', 'next_at']);
  });
  // The lab that a browser session looks at; members of several labs change it without signing in again.
  await knex.schema.alterTable('sign_ins', (t) => {
    id(t, 'lab_id').nullable();
  });
}

export async function down(knex: Knex): Promise<void> {
  await knex.schema.alterTable('sign_ins', (t) => {
    t.dropColumn('lab_id');
  });
  for (const table of ['mails', 'password_resets', 'invitations']) await knex.schema.dropTableIfExists(table);
}
