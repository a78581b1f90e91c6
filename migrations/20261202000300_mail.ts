import type { Knex } from 'knex';
import { keepForEver, keepInLab } from './lib/rules';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`CREATE TABLE mails (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    to_user_id uuid NOT NULL REFERENCES users,
    -- Where it goes, as it was when it was written.
    to_name text NOT NULL,
    to_address text NOT NULL CHECK (to_address ~ '^[^[:cntrl:][:space:]"<>@]+@[^[:cntrl:][:space:]"<>@]+$'),
    subject text NOT NULL CHECK (subject <> '' AND subject !~ '[[:cntrl:]]'),
    body text NOT NULL,
    queued_at timestamptz(3) NOT NULL,
    sent_at timestamptz(3)
  )`);
  await knex.raw('CREATE INDEX mails_by_lab ON mails (lab_id, queued_at)');
  await keepInLab(knex, 'mails', ['SELECT', 'INSERT']);
  await knex.raw('GRANT UPDATE (sent_at) ON mails TO quarterturn_app');

  await knex.raw(`CREATE TABLE due_notices (
    lab_id uuid NOT NULL REFERENCES labs,
    calibration_id uuid NOT NULL,
    stage text NOT NULL CHECK (stage IN ('due', 'overdue', 'left-tolerance')),
    noticed_at timestamptz(3) NOT NULL,
    PRIMARY KEY (calibration_id, stage),
    FOREIGN KEY (lab_id, calibration_id) REFERENCES calibrations (lab_id, id)
  )`);
  await keepInLab(knex, 'due_notices', ['SELECT', 'INSERT']);
  await keepForEver(knex, 'due_notices');
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('DROP TABLE due_notices, mails');
}
