import type { Knex } from 'knex';
import { grant, keepForEver, keepInLab } from './lib/rules';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`CREATE TABLE audit_events (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    sequence bigint NOT NULL CHECK (sequence >= 1),
    parent_hash text,
    hash text NOT NULL,
    -- Canonical JSON (RFC 8785) of the event, its parent's hash included: the text that the hash covers.
    content text NOT NULL,
    kind text NOT NULL,
    subject_id uuid NOT NULL,
    actor_id uuid NOT NULL REFERENCES users,
    at timestamptz(3) NOT NULL,
    UNIQUE (lab_id, sequence),
    UNIQUE (lab_id, hash),
    CHECK (hash = encode(sha256(convert_to(content, 'UTF8')), 'hex')),
    CHECK ((sequence = 1) = (parent_hash IS NULL)),
    FOREIGN KEY (lab_id, parent_hash) REFERENCES audit_events (lab_id, hash)
  )`);
  await keepInLab(knex, 'audit_events', ['SELECT', 'INSERT']);
  await keepForEver(knex, 'audit_events');
  await keepForEver(knex, 'account_events');

  await knex.raw(`CREATE TABLE idempotency_keys (
    user_id uuid NOT NULL REFERENCES users,
    key text NOT NULL,
    request_hash text NOT NULL,
    status smallint NOT NULL,
    headers text NOT NULL,
    body text NOT NULL,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    PRIMARY KEY (user_id, key)
  )`);
  await knex.raw('CREATE INDEX idempotency_keys_by_age ON idempotency_keys (created_at)');
  await knex.raw('ALTER TABLE idempotency_keys ENABLE ROW LEVEL SECURITY');
  await knex.raw('ALTER TABLE idempotency_keys FORCE ROW LEVEL SECURITY');
  await knex.raw(
    'CREATE POLICY of_the_person ON idempotency_keys USING (user_id = current_user_id()) WITH CHECK (user_id = current_user_id())',
  );
  await grant(knex, 'idempotency_keys', ['SELECT', 'INSERT', 'DELETE']);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('DROP TABLE idempotency_keys, audit_events');
  await knex.raw('DROP TRIGGER never_changes ON account_events');
  await knex.raw('DROP TRIGGER never_emptied ON account_events');
}
