import { readFileSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';
import type { Role } from '../../shared/permissions';
import type { Transaction } from '../../server/db/database';
import { newId } from '../../server/db/new-id';

const demoPeople = z.array(
  z.object({ id: z.number(), login: z.string(), name: z.string(), email: z.string() }),
);

export interface Person {
  readonly id: string;
  readonly name: string;
  readonly role: Role;
}

/** Makes users whose subjects are those of the local sign-in, so that choosing someone there is being them here. */
export async function addPeople(
  transaction: Transaction,
  labId: string,
  roles: Readonly<Record<string, Role>>,
  joinedAt: Date,
): Promise<(login: string) => Person> {
  const file = path.join(import.meta.dirname, '../../fake-oauth/people.json');
  const known = demoPeople.parse(JSON.parse(readFileSync(file, 'utf8')));
  const people = new Map<string, Person>();
  for (const [login, role] of Object.entries(roles)) {
    const person = known.find((one) => one.login === login);
    if (person === undefined) throw new Error(`${login} is not among the demo people`);
    const id = newId(joinedAt);
    await transaction('users').insert({
      id,
      name: person.name,
      login: person.login,
      email: person.email,
      created_at: joinedAt,
    });
    await transaction('identities').insert({
      id: newId(joinedAt),
      provider: 'github',
      subject: String(person.id),
      user_id: id,
      created_at: joinedAt,
    });
    await transaction('memberships').insert({ lab_id: labId, user_id: id, role, joined_at: joinedAt });
    people.set(login, { id, name: person.name, role });
  }
  return (login) => {
    const person = people.get(login);
    if (person === undefined) throw new Error(`${login} is not in this lab`);
    return person;
  };
}
