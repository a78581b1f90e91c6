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
    note text NOT NULL,
    retired_at timestamptz(3),
    revision integer NOT NULL DEFAULT 1,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    CHECK (CASE construction WHEN 'multi-order' THEN whole_waves >= 1 ELSE whole_waves = 0 END),
    UNIQUE (lab_id, id)
  )`);
  await knex.raw(
    'CREATE UNIQUE INDEX plates_one_of_a_name ON plates (lab_id, lower(name)) WHERE retired_at IS NULL',
  );
  await keepInLab(knex, 'plates', ['SELECT', 'INSERT', 'UPDATE']);

  await knex.raw(`CREATE TABLE mounts (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    name text NOT NULL CHECK (name <> ''),
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
  await keepInLab(knex, 'mounts', ['SELECT', 'INSERT', 'UPDATE']);

  await knex.raw(`CREATE TABLE seats (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    plate_id uuid NOT NULL,
    mount_id uuid NOT NULL,
    seated_at timestamptz(3) NOT NULL,
    left_at timestamptz(3),
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
  await keepInLab(knex, 'seats', ['SELECT', 'INSERT', 'UPDATE']);

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
    measured_at timestamptz(3) NOT NULL,
    recorded_by uuid NOT NULL REFERENCES users,
    recorded_at timestamptz(3) NOT NULL DEFAULT now(),
    FOREIGN KEY (lab_id, seat_id) REFERENCES seats (lab_id, id)
  )`);
  await knex.raw(
    'CREATE INDEX calibrations_newest ON calibrations (lab_id, seat_id, measured_at DESC, recorded_at DESC, id DESC)',
  );
  await keepInLab(knex, 'calibrations', ['SELECT', 'INSERT']);
  await keepForEver(knex, 'calibrations');

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
    position smallint NOT NULL CHECK (position BETWEEN 0 AND 5),
    plate_id uuid NOT NULL,
    -- False once the bench is retired: what stood there is remembered, and its plates are free.
    live boolean NOT NULL DEFAULT true,
    PRIMARY KEY (bench_id, position),
    FOREIGN KEY (lab_id, bench_id) REFERENCES benches (lab_id, id),
    FOREIGN KEY (lab_id, plate_id) REFERENCES plates (lab_id, id)
  )`);
  await knex.raw('CREATE UNIQUE INDEX bench_plates_one_place ON bench_plates (lab_id, plate_id) WHERE live');
  await keepInLab(knex, 'bench_plates', ['SELECT', 'INSERT', 'UPDATE', 'DELETE']);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('DROP TABLE bench_plates, benches, calibrations, seats, mounts, plates');
}
