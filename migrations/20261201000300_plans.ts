import type { Knex } from 'knex';
import { finite, keepForEver, keepInLab } from './lib/rules';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`CREATE TABLE protocols (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    created_by uuid NOT NULL REFERENCES users,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    UNIQUE (lab_id, id)
  )`);
  await keepInLab(knex, 'protocols', ['SELECT', 'INSERT']);

  await knex.raw(`CREATE TABLE drafts (
    protocol_id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    revision integer NOT NULL CHECK (revision >= 1),
    -- JSON as text: a draft keeps what was typed, and jsonb cannot hold every character.
    content text NOT NULL,
    name text NOT NULL,
    purpose text NOT NULL,
    kind text NOT NULL CHECK (kind IN ('prepare', 'apply')),
    bench_id uuid NOT NULL,
    target_count integer NOT NULL CHECK (target_count BETWEEN 0 AND 200),
    saved_at timestamptz(3) NOT NULL DEFAULT now(),
    saved_by uuid NOT NULL REFERENCES users,
    FOREIGN KEY (lab_id, protocol_id) REFERENCES protocols (lab_id, id),
    FOREIGN KEY (lab_id, bench_id) REFERENCES benches (lab_id, id)
  )`);
  await knex.raw('CREATE INDEX drafts_by_lab ON drafts (lab_id, saved_at DESC)');
  await keepInLab(knex, 'drafts', ['SELECT', 'INSERT', 'UPDATE']);

  await knex.raw(`CREATE TABLE versions (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    protocol_id uuid NOT NULL,
    bench_id uuid NOT NULL,
    number integer NOT NULL CHECK (number >= 1),
    parent_hash text,
    content_hash text NOT NULL,
    -- Canonical JSON (RFC 8785): the text that the hash covers.
    content text NOT NULL,
    -- The draft's revision that was frozen.
    draft_revision integer NOT NULL,
    protocol_name text NOT NULL,
    -- The bench's name in this version: lists show it without reading the content.
    bench_name text NOT NULL,
    message text NOT NULL CHECK (message <> ''),
    target_count integer NOT NULL CHECK (target_count BETWEEN 1 AND 200),
    tolerance_infidelity double precision NOT NULL ${finite('tolerance_infidelity')},
    saved_at timestamptz(3) NOT NULL,
    saved_by uuid NOT NULL REFERENCES users,
    UNIQUE (lab_id, id),
    UNIQUE (protocol_id, number),
    UNIQUE (protocol_id, content_hash),
    CHECK (content_hash = encode(sha256(convert_to(content, 'UTF8')), 'hex')),
    CHECK ((number = 1) = (parent_hash IS NULL)),
    FOREIGN KEY (lab_id, protocol_id) REFERENCES protocols (lab_id, id),
    FOREIGN KEY (lab_id, bench_id) REFERENCES benches (lab_id, id),
    FOREIGN KEY (protocol_id, parent_hash) REFERENCES versions (protocol_id, content_hash)
  )`);
  await knex.raw('CREATE INDEX versions_by_lab ON versions (lab_id, id DESC)');
  await keepInLab(knex, 'versions', ['SELECT', 'INSERT']);
  await keepForEver(knex, 'versions');
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('DROP TABLE versions, drafts, protocols');
}
