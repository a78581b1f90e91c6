import type { Knex } from 'knex';
import { keepForEver, keepInLab } from './lib/rules';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`CREATE TABLE files (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    -- What it was called where it came from: a label, never a path.
    name text NOT NULL CHECK (name <> ''),
    -- As its content says, never as its sender did.
    media_type text NOT NULL
      CHECK (media_type IN ('text/plain', 'image/png', 'image/jpeg', 'image/webp', 'application/pdf')),
    sha256 text NOT NULL CHECK (sha256 ~ '^[0-9a-f]{64}$'),
    size_bytes integer NOT NULL CHECK (size_bytes BETWEEN 1 AND 10485760),
    content bytea NOT NULL,
    uploaded_by uuid NOT NULL REFERENCES users,
    uploaded_at timestamptz(3) NOT NULL DEFAULT now(),
    CHECK (octet_length(content) = size_bytes),
    UNIQUE (lab_id, id)
  )`);
  await knex.raw('CREATE INDEX files_of_a_person ON files (lab_id, uploaded_by)');
  await keepInLab(knex, 'files', ['SELECT', 'INSERT']);
  await keepForEver(knex, 'files');
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('DROP TABLE files');
}
