import type { Knex } from 'knex';

const id = (t: Knex.CreateTableBuilder, name: string) =>
  t.specificType(name, 'char(36) character set ascii collate ascii_bin');
const instant = (t: Knex.CreateTableBuilder, name: string) => t.specificType(name, 'datetime(3)');
const hash = (t: Knex.CreateTableBuilder, name: string) =>
  t.specificType(name, 'char(64) character set ascii collate ascii_bin');
const created = (t: Knex.CreateTableBuilder) =>
  t.specificType('created_at', 'datetime(3) default current_timestamp(3)').notNullable();

export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('labs', (t) => {
    id(t, 'id').primary();
    t.string('name', 200).notNullable();
    t.boolean('is_demo').notNullable().defaultTo(false);
    created(t);
  });
  await knex.schema.createTable('users', (t) => {
    id(t, 'id').primary();
    t.string('email', 254).notNullable().unique();
    t.string('name', 200).notNullable();
    t.string('password_hash', 300).notNullable();
    t.integer('session_epoch').notNullable().defaultTo(0);
    created(t);
  });
  await knex.schema.createTable('memberships', (t) => {
    id(t, 'lab_id').notNullable().references('labs.id');
    id(t, 'user_id').notNullable().references('users.id');
    t.enum('role', ['lead', 'analyst', 'experimenter', 'observer']).notNullable();
    created(t);
    t.primary(['lab_id', 'user_id']);
    t.index(['user_id']);
  });
  await knex.schema.createTable('api_tokens', (t) => {
    id(t, 'id').primary();
    id(t, 'lab_id').notNullable();
    id(t, 'user_id').notNullable();
    t.string('name', 200).notNullable();
    hash(t, 'token_hash').notNullable().unique();
    t.json('scopes').notNullable();
    instant(t, 'expires_at').notNullable();
    instant(t, 'last_used_at').nullable();
    instant(t, 'revoked_at').nullable();
    created(t);
    t.foreign(['lab_id', 'user_id'])
      .references(['lab_id', 'user_id'])
      .inTable('memberships')
      .onDelete('CASCADE');
  });
  await knex.schema.createTable('sign_ins', (t) => {
    id(t, 'id').primary();
    id(t, 'user_id').notNullable().references('users.id').onDelete('CASCADE');
    t.string('agent', 300).notNullable();
    t.string('address', 60).notNullable();
    instant(t, 'last_seen_at').notNullable();
    instant(t, 'ended_at').nullable();
    created(t);
    t.index(['user_id', 'id']);
  });
  await knex.schema.createTable('studies', (t) => {
    id(t, 'id').primary();
    id(t, 'lab_id').notNullable().references('labs.id');
    t.string('name', 200).notNullable();
    t.text('question', 'mediumtext').notNullable();
    t.integer('version').notNullable().defaultTo(1);
    id(t, 'created_by').notNullable().references('users.id');
    created(t);
    t.index(['lab_id', 'id']);
  });
  await knex.schema.createTable('animals', (t) => {
    id(t, 'id').primary();
    id(t, 'lab_id').notNullable().references('labs.id');
    id(t, 'study_id').notNullable().references('studies.id');
    t.string('code', 60).notNullable();
    t.string('species', 200).notNullable();
    t.enum('sex', ['female', 'male', 'unknown']).notNullable();
    t.date('born_on').nullable();
    t.integer('version').notNullable().defaultTo(1);
    id(t, 'created_by').notNullable().references('users.id');
    created(t);
    t.unique(['study_id', 'code']);
    t.index(['lab_id', 'id']);
  });
  await knex.schema.createTable('recording_sessions', (t) => {
    id(t, 'id').primary();
    id(t, 'lab_id').notNullable().references('labs.id');
    id(t, 'study_id').notNullable().references('studies.id');
    id(t, 'animal_id').notNullable().references('animals.id');
    t.string('name', 200).notNullable();
    instant(t, 'started_at').notNullable();
    t.enum('state', ['empty', 'checking', 'waiting', 'ready', 'refused']).notNullable().defaultTo('empty');
    t.json('problems').notNullable();
    t.integer('version').notNullable().defaultTo(1);
    t.integer('readout_count').notNullable().defaultTo(0);
    id(t, 'created_by').notNullable().references('users.id');
    created(t);
    t.index(['lab_id', 'study_id', 'id']);
  });
  await knex.schema.createTable('files', (t) => {
    id(t, 'id').primary();
    id(t, 'lab_id').notNullable().references('labs.id');
    id(t, 'session_id').notNullable().references('recording_sessions.id');
    t.string('name', 255).notNullable();
    t.bigInteger('size_bytes').notNullable();
    t.integer('part_size_bytes').notNullable();
    hash(t, 'claimed_sha256').nullable();
    hash(t, 'sha256').nullable();
    t.string('object_key', 400).notNullable();
    t.string('upload_id', 400).nullable();
    t.enum('state', ['uploading', 'reading', 'readable', 'refused']).notNullable().defaultTo('uploading');
    t.string('format', 20).nullable();
    t.json('arrays').notNullable();
    t.json('problems').notNullable();
    id(t, 'created_by').notNullable().references('users.id');
    created(t);
    t.index(['session_id', 'id']);
    t.index(['lab_id', 'sha256']);
  });
  await knex.schema.createTable('file_parts', (t) => {
    id(t, 'file_id').notNullable().references('files.id').onDelete('CASCADE');
    t.integer('number').notNullable();
    t.string('etag', 200).notNullable();
    t.integer('size_bytes').notNullable();
    hash(t, 'sha256').notNullable();
    created(t);
    t.primary(['file_id', 'number']);
  });
  await knex.schema.createTable('intakes', (t) => {
    id(t, 'id').primary();
    id(t, 'lab_id').notNullable().references('labs.id');
    id(t, 'session_id').notNullable().references('recording_sessions.id');
    t.json('mapping').notNullable();
    t.enum('state', ['queued', 'running', 'waiting', 'done', 'refused', 'failed'])
      .notNullable()
      .defaultTo('queued');
    t.json('problems').notNullable();
    t.integer('attempts').notNullable().defaultTo(0);
    t.string('claimed_by', 80).nullable();
    instant(t, 'heartbeat_at').nullable();
    id(t, 'created_by').notNullable().references('users.id');
    created(t);
    t.index(['session_id', 'id']);
    t.index(['state', 'heartbeat_at']);
  });
  await knex.schema.createTable('data_versions', (t) => {
    id(t, 'id').primary();
    id(t, 'lab_id').notNullable().references('labs.id');
    id(t, 'session_id').notNullable().references('recording_sessions.id');
    id(t, 'intake_id').notNullable().references('intakes.id').unique();
    t.integer('number').notNullable();
    hash(t, 'data_hash').notNullable();
    hash(t, 'counts_hash').notNullable();
    t.integer('n_trials').notNullable();
    t.integer('n_units').notNullable();
    t.integer('n_bins').notNullable();
    t.double('bin_width_ms').notNullable();
    t.double('window_start_ms').notNullable();
    t.json('parts').notNullable();
    t.json('trial_columns').notNullable();
    t.json('unit_columns').notNullable();
    t.json('labels').notNullable();
    t.json('problems').notNullable();
    id(t, 'created_by').notNullable().references('users.id');
    created(t);
    t.unique(['session_id', 'number']);
  });
  await knex.schema.createTable('exclusions', (t) => {
    id(t, 'session_id').notNullable().references('recording_sessions.id');
    t.integer('version').notNullable();
    id(t, 'lab_id').notNullable().references('labs.id');
    t.enum('action', ['leaveOut', 'putBack']).notNullable();
    t.enum('kind', ['trial', 'unit']).notNullable();
    t.json('indices').notNullable();
    t.text('reason', 'mediumtext').notNullable();
    id(t, 'author_id').notNullable().references('users.id');
    created(t);
    t.primary(['session_id', 'version']);
  });
  await knex.schema.createTable('readouts', (t) => {
    id(t, 'id').primary();
    id(t, 'lab_id').notNullable().references('labs.id');
    id(t, 'session_id').notNullable().references('recording_sessions.id');
    id(t, 'data_version_id').notNullable().references('data_versions.id');
    t.integer('number').notNullable();
    t.json('recipe').notNullable();
    hash(t, 'recipe_hash').notNullable();
    t.string('inputs_key', 400).nullable();
    t.enum('state', ['queued', 'running', 'done', 'failed', 'cancelled']).notNullable().defaultTo('queued');
    t.json('progress').nullable();
    t.boolean('cancel_requested').notNullable().defaultTo(false);
    t.integer('attempts').notNullable().defaultTo(0);
    t.string('claimed_by', 80).nullable();
    instant(t, 'heartbeat_at').nullable();
    t.json('result').nullable();
    t.json('provenance').nullable();
    t.string('predictions_key', 400).nullable();
    t.json('problems').notNullable();
    id(t, 'author_id').notNullable().references('users.id');
    created(t);
    instant(t, 'started_at').nullable();
    instant(t, 'finished_at').nullable();
    t.unique(['session_id', 'number']);
    t.index(['lab_id', 'id']);
    t.index(['state', 'heartbeat_at']);
  });
  await knex.schema.createTable('readout_parts', (t) => {
    id(t, 'readout_id').notNullable().references('readouts.id').onDelete('CASCADE');
    t.string('part', 120).notNullable();
    t.specificType('payload', 'longblob').notNullable();
    created(t);
    t.primary(['readout_id', 'part']);
  });
  await knex.schema.createTable('audit_entries', (t) => {
    t.bigIncrements('id');
    id(t, 'lab_id').nullable();
    id(t, 'actor_id').nullable();
    t.string('action', 80).notNullable();
    t.string('subject_kind', 40).notNullable();
    t.string('subject_id', 80).notNullable();
    t.json('detail').notNullable();
    t.string('request_id', 60).nullable();
    instant(t, 'created_at').notNullable();
    hash(t, 'previous_hash').nullable();
    hash(t, 'hash').notNullable();
    t.index(['lab_id', 'id']);
  });
  // One row a chain (a lab, or the nil id for what belongs to no lab): it orders the writers and shows a cut-off tail.
  await knex.schema.createTable('audit_heads', (t) => {
    id(t, 'chain_id').primary();
    t.bigInteger('entry_count').notNullable();
    hash(t, 'hash').nullable();
  });
  await knex.schema.createTable('outbox', (t) => {
    t.bigIncrements('id');
    t.string('kind', 60).notNullable();
    t.json('payload').notNullable();
    t.integer('attempts').notNullable().defaultTo(0);
    instant(t, 'next_at').notNullable();
    instant(t, 'sent_at').nullable();
    created(t);
    t.index(['sent_at', 'next_at']);
  });
  await knex.schema.createTable('idempotency_keys', (t) => {
    id(t, 'user_id').notNullable();
    t.string('idempotency_key', 200).notNullable();
    t.string('route', 300).notNullable();
    hash(t, 'request_hash').notNullable();
    t.integer('status').nullable();
    t.specificType('response', 'longtext').nullable();
    created(t);
    t.primary(['user_id', 'idempotency_key']);
    t.index(['created_at']);
  });
}

export async function down(knex: Knex): Promise<void> {
  for (const table of [
    'idempotency_keys',
    'outbox',
    'audit_heads',
    'audit_entries',
    'readout_parts',
    'readouts',
    'exclusions',
    'data_versions',
    'intakes',
    'file_parts',
    'files',
    'recording_sessions',
    'animals',
    'studies',
    'sign_ins',
    'api_tokens',
    'memberships',
    'users',
    'labs',
  ])
    await knex.schema.dropTableIfExists(table);
}
