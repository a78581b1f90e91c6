import { readFileSync } from 'node:fs';

/**
 * Somebody who can be chosen on the page. The id stands for an account's number at the real service, and is far above any that
 * the service has given out: a demo person in a database must never turn out to be a real account.
 */
export interface Person {
  readonly id: number;
  readonly login: string;
  readonly name: string;
  readonly email: string;
  readonly note: string;
}

function isPerson(value: unknown): value is Person {
  return (
    typeof value === 'object' &&
    value !== null &&
    'id' in value &&
    Number.isSafeInteger(value.id) &&
    'login' in value &&
    typeof value.login === 'string' &&
    'name' in value &&
    typeof value.name === 'string' &&
    'email' in value &&
    typeof value.email === 'string' &&
    'note' in value &&
    typeof value.note === 'string'
  );
}

/** Reads the demo people from people.json beside this file. Throws when an entry lacks a field. */
export function readDemoPeople(): readonly Person[] {
  const content: unknown = JSON.parse(readFileSync(new URL('people.json', import.meta.url), 'utf8'));
  if (!Array.isArray(content) || !content.every(isPerson)) {
    throw new Error('fake-oauth/people.json must be a list of people with id, login, name, email and note.');
  }
  return content;
}
