import type { Knex } from 'knex';
import { z } from 'zod';
import { inTransaction } from '../../db/in-transaction';
import { newId } from '../../db/new-id';
import { brokenUnique } from '../../db/sql-state';
import type { GitHubPerson } from './github';

const provider = 'github';
const personRow = z.object({ id: z.string(), session_epoch: z.number(), disabled_at: z.date().nullable() });
const nobody = { userId: null, labId: null };

interface KnownPerson {
  readonly userId: string;
  readonly epoch: number;
  readonly disabled: boolean;
}

/**
 * The person behind an identity, made at the first sign-in. Provider and subject alone decide: a changed login keeps
 * the person, and the same e-mail address under another account is another person.
 */
export async function knowPerson(database: Knex, person: GitHubPerson): Promise<KnownPerson> {
  try {
    return (await findPerson(database, person)) ?? (await makePerson(database, person));
  } catch (error) {
    // Two first sign-ins at once: the other one made the person.
    if (brokenUnique(error) === null) throw error;
    const found = await findPerson(database, person);
    if (found === null) throw error;
    return found;
  }
}

function findPerson(database: Knex, person: GitHubPerson): Promise<KnownPerson | null> {
  return inTransaction(database, nobody, async (transaction) => {
    const found: unknown = await transaction('users')
      .join('identities', 'identities.user_id', 'users.id')
      .where({ 'identities.provider': provider, 'identities.subject': person.subject })
      .first('users.id', 'users.session_epoch', 'users.disabled_at');
    if (found === undefined) return null;
    const row = personRow.parse(found);
    await transaction('users')
      .where({ id: row.id })
      .update({
        name: person.name,
        login: person.login,
        ...(person.email === null ? {} : { email: person.email }),
      });
    return { userId: row.id, epoch: row.session_epoch, disabled: row.disabled_at !== null };
  });
}

function makePerson(database: Knex, person: GitHubPerson): Promise<KnownPerson> {
  return inTransaction(database, nobody, async (transaction) => {
    const userId = newId();
    await transaction('users').insert({
      id: userId,
      name: person.name,
      login: person.login,
      email: person.email,
    });
    await transaction('identities').insert({
      id: newId(),
      provider,
      subject: person.subject,
      user_id: userId,
    });
    return { userId, epoch: 0, disabled: false };
  });
}
