import type { Knex } from 'knex';
import { finite, keepForEver, keepInLab } from './lib/rules';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`CREATE TABLE plates (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    name text NOT NULL CHECK (name <> ''),
    kind text NOT NULL CHECK (kind IN ('half', 'quarter', 'other')),
    design_wavelength_nm double precision NOT NULL ${finite('design_wavelength_nm')},
    construction text NOT NULL
      CHECK (construction IN ('true-zero-order', 'compound-zero-order', 'multi-order', 'achromatic', 'unknown')),
    material text CHECK (material IN ('quartz', 'magnesium-fluoride', 'calcite', 'sapphire')),
    whole_waves smallint NOT NULL,
    serial text NOT NULL,
    clear_aperture_mm double precision ${finite('clear_aperture_mm')} CHECK (clear_aperture_mm > 0),
    coating_from_nm double precision ${finite('coating_from_nm')},
    coating_to_nm double precision ${finite('coating_to_nm')},
    damage_note text NOT NULL,
    note text NOT NULL,
    search_text text NOT NULL GENERATED ALWAYS AS
      (lower(name || ' ' || serial || ' ' || coalesce(material, '') || ' ' || note)) STORED,
    retired_at timestamptz(3),
    revision integer NOT NULL DEFAULT 1,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    -- Kept by the triggers below, so that a page of a long list need not look for each plate's newest calibration.
    seat_id uuid,
    calibration_id uuid,
    calibrated_at timestamptz(3),
    has_open_question boolean NOT NULL DEFAULT false,
    CHECK ((coating_from_nm IS NULL) = (coating_to_nm IS NULL)),
    CHECK (coating_to_nm > coating_from_nm),
    CHECK (CASE construction WHEN 'multi-order' THEN whole_waves >= 1 ELSE whole_waves = 0 END),
    UNIQUE (lab_id, id)
  )`);
  await knex.raw(
    'CREATE UNIQUE INDEX plates_one_of_a_name ON plates (lab_id, lower(name)) WHERE retired_at IS NULL',
  );
  // Names by their numbers: H-2 before H-10.
  await knex.raw(
    `CREATE COLLATION IF NOT EXISTS by_number (provider = icu, locale = 'en-u-kn-true-ks-level2')`,
  );
  await knex.raw('CREATE INDEX plates_by_name ON plates (lab_id, (name COLLATE by_number), id)');
  await knex.raw(
    `CREATE INDEX plates_by_age ON plates
      (lab_id, (coalesce(calibrated_at, '-infinity'::timestamptz)), (name COLLATE by_number), id)`,
  );
  await knex.raw(
    'CREATE INDEX plates_by_wavelength ON plates (lab_id, design_wavelength_nm, (name COLLATE by_number), id)',
  );
  await keepInLab(knex, 'plates', ['SELECT', 'INSERT', 'UPDATE']);

  await knex.raw(`CREATE TABLE mounts (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    name text NOT NULL CHECK (name <> ''),
    drive text NOT NULL CHECK (drive IN ('hand', 'motor')),
    note text NOT NULL,
    retired_at timestamptz(3),
    revision integer NOT NULL DEFAULT 1,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    direction smallint NOT NULL CHECK (direction IN (1, -1)),
    resolution_deg double precision NOT NULL ${finite('resolution_deg')} CHECK (resolution_deg > 0),
    repeatability_deg double precision NOT NULL ${finite('repeatability_deg')} CHECK (repeatability_deg >= 0),
    range_from_deg double precision ${finite('range_from_deg')},
    range_to_deg double precision ${finite('range_to_deg')},
    speed_deg_per_s double precision ${finite('speed_deg_per_s')} CHECK (speed_deg_per_s > 0),
    backlash_deg double precision NOT NULL ${finite('backlash_deg')} CHECK (backlash_deg >= 0),
    approach text NOT NULL CHECK (approach IN ('rising', 'falling', 'either')),
    CHECK ((range_from_deg IS NULL) = (range_to_deg IS NULL)),
    CHECK (range_to_deg - range_from_deg >= 180),
    UNIQUE (lab_id, id)
  )`);
  await knex.raw(
    'CREATE UNIQUE INDEX mounts_one_of_a_name ON mounts (lab_id, lower(name)) WHERE retired_at IS NULL',
  );
  await knex.raw('CREATE INDEX mounts_by_name ON mounts (lab_id, (name COLLATE by_number), id)');
  await keepInLab(knex, 'mounts', ['SELECT', 'INSERT', 'UPDATE']);

  await knex.raw(`CREATE TABLE seats (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    plate_id uuid NOT NULL,
    mount_id uuid NOT NULL,
    seated_at timestamptz(3) NOT NULL,
    seated_by uuid NOT NULL REFERENCES users,
    left_at timestamptz(3),
    -- Why it was taken out; null as long as it is seated.
    left_why text,
    CHECK ((left_at IS NULL) = (left_why IS NULL)),
    -- A seat lasts: two that began in one mount at one moment could not be told apart.
    CHECK (left_at > seated_at),
    UNIQUE (lab_id, id),
    FOREIGN KEY (lab_id, plate_id) REFERENCES plates (lab_id, id),
    FOREIGN KEY (lab_id, mount_id) REFERENCES mounts (lab_id, id)
  )`);
  await knex.raw(
    'CREATE UNIQUE INDEX seats_one_of_a_plate ON seats (lab_id, plate_id) WHERE left_at IS NULL',
  );
  await knex.raw(
    'CREATE UNIQUE INDEX seats_one_of_a_mount ON seats (lab_id, mount_id) WHERE left_at IS NULL',
  );
  await knex.raw('CREATE INDEX seats_of_a_plate ON seats (lab_id, plate_id, seated_at DESC)');
  await knex.raw('CREATE INDEX seats_of_a_mount ON seats (lab_id, mount_id, seated_at DESC)');
  await keepInLab(knex, 'seats', ['SELECT', 'INSERT']);
  // A seat ends once, and nothing else of it changes.
  await knex.raw('GRANT UPDATE (left_at, left_why) ON seats TO quarterturn_app');
  await knex.raw(`CREATE FUNCTION refuse_seat_change() RETURNS trigger LANGUAGE plpgsql AS $$ BEGIN
    IF OLD.left_at IS NOT NULL OR NEW.left_at IS NULL THEN
      RAISE EXCEPTION 'a seat that has ended stays so' USING ERRCODE = 'integrity_constraint_violation';
    END IF;
    RETURN NEW;
  END $$`);
  await knex.raw(
    'CREATE TRIGGER ends_once BEFORE UPDATE ON seats FOR EACH ROW EXECUTE FUNCTION refuse_seat_change()',
  );

  await knex.raw(`CREATE TABLE calibrations (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    seat_id uuid NOT NULL,
    wavelength_nm double precision NOT NULL ${finite('wavelength_nm')},
    temperature_c double precision ${finite('temperature_c')},
    retardance_deg double precision NOT NULL CHECK (retardance_deg > 0 AND retardance_deg < 360),
    retardance_sigma_deg double precision NOT NULL ${finite('retardance_sigma_deg')} CHECK (retardance_sigma_deg >= 0),
    offset_deg double precision NOT NULL CHECK (offset_deg >= 0 AND offset_deg < 360),
    offset_sigma_deg double precision NOT NULL ${finite('offset_sigma_deg')} CHECK (offset_sigma_deg >= 0),
    method text NOT NULL,
    note text NOT NULL,
    -- What the measurement could not tell: fast or slow axis, this retardance or 360° less it, blind near 180°.
    open_questions text[] NOT NULL CHECK (open_questions <@ ARRAY['axis', 'branch', 'blind']),
    -- The calibration whose open question this one answers.
    settles_id uuid,
    -- Of a scan: the file as it came, and canonical JSON of what was read, left out and fitted.
    file_id uuid,
    fit text,
    measured_at timestamptz(3) NOT NULL,
    recorded_by uuid NOT NULL REFERENCES users,
    -- Who recorded it in the cabinet that it was imported from, by name; recorded_by is then who imported it.
    recorded_as text CHECK (recorded_as <> ''),
    recorded_at timestamptz(3) NOT NULL DEFAULT now(),
    UNIQUE (lab_id, id),
    FOREIGN KEY (lab_id, seat_id) REFERENCES seats (lab_id, id),
    -- Many at once come in the order in which they were measured, which need not be that in which they settle each other.
    FOREIGN KEY (lab_id, settles_id) REFERENCES calibrations (lab_id, id) DEFERRABLE INITIALLY IMMEDIATE,
    FOREIGN KEY (lab_id, file_id) REFERENCES files (lab_id, id)
  )`);
  await knex.raw(
    'CREATE INDEX calibrations_newest ON calibrations (lab_id, seat_id, measured_at DESC, recorded_at DESC, id DESC)',
  );
  await keepInLab(knex, 'calibrations', ['SELECT', 'INSERT']);
  await keepForEver(knex, 'calibrations');
  await plateFollowsItsSeat(knex);

  await knex.raw(`CREATE TABLE plate_files (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    plate_id uuid NOT NULL,
    file_id uuid NOT NULL,
    kind text NOT NULL CHECK (kind IN ('photo', 'data-sheet')),
    removed_at timestamptz(3),
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    UNIQUE (lab_id, plate_id, file_id),
    FOREIGN KEY (lab_id, plate_id) REFERENCES plates (lab_id, id),
    FOREIGN KEY (lab_id, file_id) REFERENCES files (lab_id, id)
  )`);
  await keepInLab(knex, 'plate_files', ['SELECT', 'INSERT', 'UPDATE']);

  await knex.raw(`CREATE TABLE scan_columns (
    lab_id uuid NOT NULL REFERENCES labs,
    -- What a file's head looks like: names, count and delimiter.
    signature text NOT NULL,
    -- JSON of which column is what, as a person chose it last.
    columns text NOT NULL,
    used_at timestamptz(3) NOT NULL,
    PRIMARY KEY (lab_id, signature)
  )`);
  await keepInLab(knex, 'scan_columns', ['SELECT', 'INSERT', 'UPDATE']);

  await knex.raw(`CREATE TABLE benches (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    name text NOT NULL CHECK (name <> ''),
    wavelength_nm double precision NOT NULL ${finite('wavelength_nm')},
    wavelength_sigma_nm double precision NOT NULL ${finite('wavelength_sigma_nm')} CHECK (wavelength_sigma_nm >= 0),
    temperature_c double precision ${finite('temperature_c')},
    temperature_sigma_k double precision NOT NULL ${finite('temperature_sigma_k')} CHECK (temperature_sigma_k >= 0),
    input_expression text NOT NULL,
    polariser_sigma_deg double precision NOT NULL ${finite('polariser_sigma_deg')} CHECK (polariser_sigma_deg >= 0),
    polariser_extinction double precision ${finite('polariser_extinction')} CHECK (polariser_extinction > 0 AND polariser_extinction < 1),
    laser_class text CHECK (laser_class IN ('1', '1M', '2', '2M', '3R', '3B', '4')),
    hazard_wavelengths_nm double precision[] NOT NULL,
    -- JSON: name, dark rate and efficiency of each detector.
    detectors text NOT NULL,
    retired_at timestamptz(3),
    revision integer NOT NULL DEFAULT 1,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    UNIQUE (lab_id, id)
  )`);
  await knex.raw(
    'CREATE UNIQUE INDEX benches_one_of_a_name ON benches (lab_id, lower(name)) WHERE retired_at IS NULL',
  );
  await keepInLab(knex, 'benches', ['SELECT', 'INSERT', 'UPDATE']);

  await knex.raw(`CREATE TABLE bench_plates (
    lab_id uuid NOT NULL REFERENCES labs,
    bench_id uuid NOT NULL,
    part text NOT NULL CHECK (part IN ('preparation', 'analysis')),
    position smallint NOT NULL CHECK (position BETWEEN 0 AND 5),
    plate_id uuid NOT NULL,
    -- False once the bench is retired: what stood there is remembered, and its plates are free.
    live boolean NOT NULL DEFAULT true,
    PRIMARY KEY (bench_id, part, position),
    FOREIGN KEY (lab_id, bench_id) REFERENCES benches (lab_id, id),
    FOREIGN KEY (lab_id, plate_id) REFERENCES plates (lab_id, id)
  )`);
  await knex.raw('CREATE UNIQUE INDEX bench_plates_one_place ON bench_plates (lab_id, plate_id) WHERE live');
  await keepInLab(knex, 'bench_plates', ['SELECT', 'INSERT', 'UPDATE', 'DELETE']);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(
    'DROP TABLE bench_plates, benches, scan_columns, plate_files, calibrations, seats, mounts, plates',
  );
  await knex.raw('DROP FUNCTION plate_takes_seat, plate_takes_calibration, refuse_seat_change');
  await knex.raw('DROP COLLATION by_number');
}

/** A plate shows the newest calibration of its present seat, and none of a seat that has ended. */
async function plateFollowsItsSeat(knex: Knex): Promise<void> {
  await knex.raw(`CREATE FUNCTION plate_takes_seat() RETURNS trigger LANGUAGE plpgsql AS $$ BEGIN
    UPDATE plates SET seat_id = CASE WHEN NEW.left_at IS NULL THEN NEW.id END,
      calibration_id = NULL, calibrated_at = NULL, has_open_question = false
    WHERE lab_id = NEW.lab_id AND id = NEW.plate_id;
    RETURN NULL;
  END $$`);
  await knex.raw(
    'CREATE TRIGGER plate_follows AFTER INSERT OR UPDATE ON seats FOR EACH ROW EXECUTE FUNCTION plate_takes_seat()',
  );
  // Once for all rows of a statement: an import brings thousands, and each change of a plate leaves a dead row behind.
  await knex.raw(`CREATE FUNCTION plate_takes_calibration() RETURNS trigger LANGUAGE plpgsql AS $$ BEGIN
    UPDATE plates p SET calibration_id = newest.id, calibrated_at = newest.measured_at,
      has_open_question = cardinality(newest.open_questions) > 0
    FROM (SELECT DISTINCT lab_id, seat_id FROM added) measured
    JOIN seats s ON s.lab_id = measured.lab_id AND s.id = measured.seat_id
    CROSS JOIN LATERAL (SELECT c.id, c.measured_at, c.open_questions FROM calibrations c
      WHERE c.lab_id = measured.lab_id AND c.seat_id = measured.seat_id
      ORDER BY c.measured_at DESC, c.recorded_at DESC, c.id DESC LIMIT 1) newest
    WHERE p.lab_id = s.lab_id AND p.id = s.plate_id AND p.seat_id = s.id;
    RETURN NULL;
  END $$`);
  await knex.raw(
    'CREATE TRIGGER plate_follows AFTER INSERT ON calibrations REFERENCING NEW TABLE AS added FOR EACH STATEMENT EXECUTE FUNCTION plate_takes_calibration()',
  );
}
