import type { Knex } from 'knex';
import PgBoss from 'pg-boss';

const schema = 'pgboss';
const second = 1;
const minute = 60 * second;

/**
 * Kinds of jobs. A job whose server was killed is given to another once it has been under way for as long as
 * `expireInSeconds`; whoever works on it keeps well below that. Retries wait longer each time, from `retryDelay` seconds on.
 */
const queues = [
  // Sees which labs there are and queues a look at each.
  {
    name: 'daily-look',
    retryLimit: 5,
    retryDelay: 10,
    retryBackoff: true,
    expireInSeconds: minute,
    retentionMinutes: 24 * 60,
  },
  {
    name: 'lab-look',
    retryLimit: 5,
    retryDelay: 10,
    retryBackoff: true,
    expireInSeconds: minute,
    retentionMinutes: 24 * 60,
  },
  {
    name: 'reliance',
    retryLimit: 10,
    retryDelay: 2,
    retryBackoff: true,
    expireInSeconds: 5 * minute,
    retentionMinutes: 7 * 24 * 60,
  },
  // A mail server that is down for half a day still gets everything.
  {
    name: 'mail',
    retryLimit: 14,
    retryDelay: 10,
    retryBackoff: true,
    expireInSeconds: minute,
    retentionMinutes: 7 * 24 * 60,
  },
] as const;

export async function up(knex: Knex): Promise<void> {
  await knex.raw(insideTransaction(PgBoss.getConstructionPlans(schema)));
  for (const { name, ...options } of queues) {
    await knex.raw(`SELECT ${schema}.create_queue(?, ?::json)`, [
      name,
      JSON.stringify({ policy: 'standard', ...options }),
    ]);
  }
  // What sending, working, expiring and archiving ask for; making and removing queues stays with the owner.
  await knex.raw(`REVOKE EXECUTE ON ALL FUNCTIONS IN SCHEMA ${schema} FROM PUBLIC`);
  await knex.raw(`GRANT USAGE ON SCHEMA ${schema} TO quarterturn_app`);
  await knex.raw(`GRANT SELECT, INSERT, UPDATE, DELETE ON ${schema}.job TO quarterturn_app`);
  await knex.raw(`GRANT SELECT, INSERT, DELETE ON ${schema}.archive TO quarterturn_app`);
  await knex.raw(`GRANT SELECT ON ${schema}.queue TO quarterturn_app`);
  await knex.raw(`GRANT SELECT ON ${schema}.version TO quarterturn_app`);
  await knex.raw(`GRANT UPDATE (maintained_on) ON ${schema}.version TO quarterturn_app`);

  // The labs' own policy holds for their owner too, so the owner sees every lab only inside this function.
  await knex.raw(`CREATE POLICY of_the_daily_look ON labs FOR SELECT TO CURRENT_USER
    USING (current_setting('app.every_lab', true) = 'ids')`);
  await knex.raw(`CREATE FUNCTION every_lab_id() RETURNS SETOF uuid LANGUAGE plpgsql SECURITY DEFINER
    SET search_path = pg_catalog, public AS $$ BEGIN
    PERFORM set_config('app.every_lab', 'ids', true);
    RETURN QUERY SELECT id FROM public.labs;
    PERFORM set_config('app.every_lab', '', true);
  END $$`);
  await knex.raw('REVOKE EXECUTE ON FUNCTION every_lab_id() FROM PUBLIC');
  await knex.raw('GRANT EXECUTE ON FUNCTION every_lab_id() TO quarterturn_app');
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('DROP FUNCTION every_lab_id()');
  await knex.raw('DROP POLICY of_the_daily_look ON labs');
  await knex.raw(`DROP SCHEMA ${schema} CASCADE`);
}

/** The package's plans open and commit a transaction of their own; a migration is one already. */
function insideTransaction(plans: string): string {
  const bare = plans.replace(/^\s*BEGIN;/, '').replace(/COMMIT;\s*$/, '');
  if (/\bCOMMIT\b/.test(bare))
    throw new Error('the plans of pg-boss commit in another place than they used to');
  return bare;
}
