import type { Knex } from 'knex';

/** The role that the server connects as. It owns nothing, so row-level security and these grants are all it has. */
const server = 'quarterturn_app';

export type Right = 'SELECT' | 'INSERT' | 'UPDATE' | 'DELETE';

/** Gives the server's role these rights on a table and no other. */
export async function grant(knex: Knex, table: string, rights: readonly Right[]): Promise<void> {
  await knex.raw(`GRANT ${rights.join(', ')} ON ${table} TO ${server}`);
}

/**
 * A table whose every row belongs to one lab: a transaction sees and writes only the lab that `app.lab_id` names,
 * the tables' owner included.
 */
export async function keepInLab(knex: Knex, table: string, rights: readonly Right[]): Promise<void> {
  await knex.raw(`ALTER TABLE ${table} ENABLE ROW LEVEL SECURITY`);
  await knex.raw(`ALTER TABLE ${table} FORCE ROW LEVEL SECURITY`);
  await knex.raw(
    `CREATE POLICY of_the_lab ON ${table} USING (lab_id = current_lab_id()) WITH CHECK (lab_id = current_lab_id())`,
  );
  await grant(knex, table, rights);
}

/** A table whose rows are never changed or removed, by anybody: a correction is a new row. */
export async function keepForEver(knex: Knex, table: string): Promise<void> {
  await knex.raw(
    `CREATE TRIGGER never_changes BEFORE UPDATE OR DELETE ON ${table} FOR EACH ROW EXECUTE FUNCTION refuse_change()`,
  );
  await knex.raw(
    `CREATE TRIGGER never_emptied BEFORE TRUNCATE ON ${table} FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()`,
  );
}

/** SQL of a check that a double precision column holds a number: NaN sorts above Infinity, so both fall out. */
export function finite(column: string): string {
  return `CHECK (${column} > '-Infinity' AND ${column} < 'Infinity')`;
}
