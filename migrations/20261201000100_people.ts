import type { Knex } from 'knex';
import { grant, keepInLab } from './lib/rules';

export async function up(knex: Knex): Promise<void> {
  // An unset setting is null in a fresh connection and '' once a transaction has set it: both mean "no lab".
  await knex.raw(`CREATE FUNCTION current_lab_id() RETURNS uuid LANGUAGE sql STABLE AS
    $$ SELECT nullif(current_setting('app.lab_id', true), '')::uuid $$`);
  await knex.raw(`CREATE FUNCTION current_user_id() RETURNS uuid LANGUAGE sql STABLE AS
    $$ SELECT nullif(current_setting('app.user_id', true), '')::uuid $$`);
  await knex.raw(`CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS
    $$ BEGIN RAISE EXCEPTION 'rows of % are never changed', TG_TABLE_NAME USING ERRCODE = 'integrity_constraint_violation'; END $$`);

  await knex.raw(`CREATE TABLE users (
    id uuid PRIMARY KEY,
    name text NOT NULL CHECK (name <> ''),
    login text NOT NULL CHECK (login <> ''),
    email text,
    -- Raised by signing out everywhere: sessions made before are dead at once.
    session_epoch integer NOT NULL DEFAULT 0,
    disabled_at timestamptz(3),
    created_at timestamptz(3) NOT NULL DEFAULT now()
  )`);
  await grant(knex, 'users', ['SELECT', 'INSERT']);
  await knex.raw('GRANT UPDATE (name, login, email, session_epoch) ON users TO quarterturn_app');

  await knex.raw(`CREATE TABLE identities (
    id uuid PRIMARY KEY,
    provider text NOT NULL,
    subject text NOT NULL,
    user_id uuid NOT NULL REFERENCES users,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    UNIQUE (provider, subject)
  )`);
  await knex.raw('CREATE INDEX identities_by_user ON identities (user_id)');
  await grant(knex, 'identities', ['SELECT', 'INSERT']);

  await knex.raw(`CREATE TABLE sessions (
    sid varchar NOT NULL PRIMARY KEY,
    sess json NOT NULL,
    expire timestamptz(6) NOT NULL,
    user_id uuid GENERATED ALWAYS AS ((sess ->> 'userId')::uuid) STORED,
    -- An ended session stays as a stone until it would have expired, so that a slow request cannot bring it back.
    ended_at timestamptz(3),
    seen_at timestamptz(3) NOT NULL DEFAULT now()
  )`);
  await knex.raw('CREATE INDEX sessions_by_expire ON sessions (expire)');
  await knex.raw('CREATE INDEX sessions_by_user ON sessions (user_id) WHERE ended_at IS NULL');
  await grant(knex, 'sessions', ['SELECT', 'INSERT', 'UPDATE', 'DELETE']);

  await knex.raw(`CREATE TABLE rate_limits (
    key varchar(255) PRIMARY KEY,
    points integer NOT NULL DEFAULT 0,
    expire bigint
  )`);
  await knex.raw('CREATE INDEX rate_limits_by_expire ON rate_limits (expire)');
  await grant(knex, 'rate_limits', ['SELECT', 'INSERT', 'UPDATE', 'DELETE']);

  await knex.raw(`CREATE TABLE account_events (
    id uuid PRIMARY KEY,
    kind text NOT NULL,
    user_id uuid REFERENCES users,
    detail text NOT NULL,
    request_id uuid NOT NULL,
    at timestamptz(3) NOT NULL DEFAULT now()
  )`);
  await grant(knex, 'account_events', ['INSERT']);

  await knex.raw(`CREATE TABLE labs (
    id uuid PRIMARY KEY,
    name text NOT NULL CHECK (name <> ''),
    phase text NOT NULL CHECK (phase IN ('kz-wt', 'wt-kz')),
    handedness text NOT NULL CHECK (handedness IN ('receiver', 'source')),
    s3_sign text NOT NULL CHECK (s3_sign IN ('R', 'L')),
    calibration_due_days integer NOT NULL CHECK (calibration_due_days BETWEEN 1 AND 3650),
    runs_started integer NOT NULL DEFAULT 0,
    created_at timestamptz(3) NOT NULL DEFAULT now()
  )`);

  await knex.raw(`CREATE TABLE memberships (
    lab_id uuid NOT NULL REFERENCES labs,
    user_id uuid NOT NULL REFERENCES users,
    role text NOT NULL CHECK (role IN ('lead', 'designer', 'operator', 'guest')),
    joined_at timestamptz(3) NOT NULL DEFAULT now(),
    PRIMARY KEY (lab_id, user_id)
  )`);
  await knex.raw('CREATE INDEX memberships_by_user ON memberships (user_id)');
  await keepInLab(knex, 'memberships', ['SELECT', 'INSERT', 'UPDATE', 'DELETE']);
  await knex.raw('CREATE POLICY of_the_person ON memberships FOR SELECT USING (user_id = current_user_id())');

  await knex.raw('ALTER TABLE labs ENABLE ROW LEVEL SECURITY');
  await knex.raw('ALTER TABLE labs FORCE ROW LEVEL SECURITY');
  await knex.raw(
    'CREATE POLICY of_the_lab ON labs USING (id = current_lab_id()) WITH CHECK (id = current_lab_id())',
  );
  await knex.raw(`CREATE POLICY of_the_person ON labs FOR SELECT
    USING (id IN (SELECT lab_id FROM memberships WHERE user_id = current_user_id()))`);
  await grant(knex, 'labs', ['SELECT', 'INSERT', 'UPDATE']);

  await knex.raw(`CREATE TABLE invitations (
    id uuid PRIMARY KEY,
    lab_id uuid NOT NULL REFERENCES labs,
    role text NOT NULL CHECK (role IN ('lead', 'designer', 'operator', 'guest')),
    note text NOT NULL,
    token_hash text NOT NULL UNIQUE,
    created_by uuid NOT NULL REFERENCES users,
    created_at timestamptz(3) NOT NULL DEFAULT now(),
    expires_at timestamptz(3) NOT NULL,
    accepted_by uuid REFERENCES users,
    accepted_at timestamptz(3),
    revoked_at timestamptz(3),
    CHECK ((accepted_by IS NULL) = (accepted_at IS NULL))
  )`);
  await knex.raw('CREATE INDEX invitations_by_lab ON invitations (lab_id)');
  await keepInLab(knex, 'invitations', ['SELECT', 'INSERT', 'UPDATE']);
  // Someone who holds the link is no member yet: the token they hold is what lets them see this one row.
  await knex.raw(`CREATE POLICY of_the_holder ON invitations FOR SELECT
    USING (token_hash = nullif(current_setting('app.invitation_hash', true), ''))`);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('DROP TABLE invitations');
  await knex.raw('DROP POLICY of_the_person ON labs');
  await knex.raw('DROP TABLE memberships, labs, account_events, rate_limits, sessions, identities, users');
  await knex.raw('DROP FUNCTION refuse_change(), current_user_id(), current_lab_id()');
}
