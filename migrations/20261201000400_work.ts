import type { Knex } from 'knex';
import { finite, keepForEver, keepInLab } from './lib/rules';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`CREATE TABLE runs (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    number integer NOT NULL CHECK (number >= 1),
    version_id uuid NOT NULL,
    state text NOT NULL CHECK (state IN ('running', 'paused', 'finished')),
    pause_note text NOT NULL DEFAULT '',
    setting_count integer NOT NULL CHECK (setting_count >= 1),
    -- Where each dial stood at the start, in beam order; null where nobody said.
    start_dials_deg double precision[] NOT NULL,
    events_recorded integer NOT NULL DEFAULT 0,
    readings_recorded integer NOT NULL DEFAULT 0,
    started_at timestamptz(3) NOT NULL,
    started_by uuid NOT NULL REFERENCES users,
    finished_at timestamptz(3),
    UNIQUE (lab_id, id),
    UNIQUE (lab_id, number),
    CHECK ((state = 'finished') = (finished_at IS NOT NULL)),
    FOREIGN KEY (lab_id, version_id) REFERENCES versions (lab_id, id)
  )`);
  await knex.raw('CREATE INDEX runs_by_version ON runs (lab_id, version_id)');
  await keepInLab(knex, 'runs', ['SELECT', 'INSERT']);
  await knex.raw(
    `GRANT UPDATE (state, pause_note, events_recorded, readings_recorded, finished_at) ON runs TO quarterturn_app`,
  );

  await knex.raw(`CREATE TABLE readings (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    run_id uuid NOT NULL,
    sequence integer NOT NULL CHECK (sequence >= 1),
    setting_index integer NOT NULL CHECK (setting_index >= 0),
    outcome text NOT NULL CHECK (outcome IN ('done', 'skipped')),
    dialled_deg double precision[] NOT NULL,
    -- 1 - F of what the dials really said, with the version's own plates; null when skipped.
    dialled_infidelity double precision ${finite('dialled_infidelity')},
    note text NOT NULL,
    recorded_at timestamptz(3) NOT NULL,
    recorded_by uuid NOT NULL REFERENCES users,
    UNIQUE (run_id, sequence),
    CHECK ((outcome = 'done') = (dialled_infidelity IS NOT NULL)),
    CHECK ((outcome = 'done') = (cardinality(dialled_deg) > 0)),
    FOREIGN KEY (lab_id, run_id) REFERENCES runs (lab_id, id)
  )`);
  await keepInLab(knex, 'readings', ['SELECT', 'INSERT']);
  await keepForEver(knex, 'readings');

  await knex.raw(`CREATE TABLE run_events (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    run_id uuid NOT NULL,
    sequence integer NOT NULL CHECK (sequence >= 1),
    kind text NOT NULL CHECK (kind IN ('started', 'paused', 'resumed', 'finished')),
    note text NOT NULL,
    at timestamptz(3) NOT NULL,
    by_user uuid NOT NULL REFERENCES users,
    UNIQUE (run_id, sequence),
    FOREIGN KEY (lab_id, run_id) REFERENCES runs (lab_id, id)
  )`);
  await keepInLab(knex, 'run_events', ['SELECT', 'INSERT']);
  await keepForEver(knex, 'run_events');
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('DROP TABLE run_events, readings, runs');
}
