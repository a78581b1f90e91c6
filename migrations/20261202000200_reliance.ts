import type { Knex } from 'knex';
import { keepForEver, keepInLab } from './lib/rules';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`CREATE TABLE version_plates (
    lab_id uuid NOT NULL REFERENCES labs,
    version_id uuid NOT NULL,
    plate_id uuid NOT NULL,
    PRIMARY KEY (version_id, plate_id),
    FOREIGN KEY (lab_id, version_id) REFERENCES versions (lab_id, id),
    FOREIGN KEY (lab_id, plate_id) REFERENCES plates (lab_id, id)
  )`);
  await knex.raw('CREATE INDEX version_plates_by_plate ON version_plates (lab_id, plate_id)');
  await keepInLab(knex, 'version_plates', ['SELECT', 'INSERT']);
  await keepForEver(knex, 'version_plates');

  await knex.raw(`CREATE TABLE reliance_reports (
    lab_id uuid NOT NULL REFERENCES labs,
    version_id uuid PRIMARY KEY,
    -- From the change of what the version relies on until its job is done.
    waiting boolean NOT NULL,
    -- Rows of the report that is being worked out.
    done integer NOT NULL CHECK (done BETWEEN 0 AND total),
    total integer NOT NULL,
    computed_at timestamptz(3),
    -- SHA-256 of all that the report was made from: bench, plates, calibrations, solver.
    signature text,
    -- JSON; null until the first one is there.
    report text,
    stale boolean NOT NULL DEFAULT false,
    -- The calibration by which targets left tolerance at their old dials; null where none did.
    left_by uuid,
    CHECK ((computed_at IS NULL) = (report IS NULL)),
    CHECK ((computed_at IS NULL) = (signature IS NULL)),
    FOREIGN KEY (lab_id, version_id) REFERENCES versions (lab_id, id)
  )`);
  await knex.raw('CREATE INDEX reliance_reports_stale ON reliance_reports (lab_id) WHERE stale');
  await knex.raw(
    'CREATE INDEX reliance_reports_left ON reliance_reports (lab_id, left_by) WHERE left_by IS NOT NULL',
  );
  await keepInLab(knex, 'reliance_reports', ['SELECT', 'INSERT', 'UPDATE']);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('DROP TABLE reliance_reports, version_plates');
}
