import { z } from 'zod';

const databaseError = z.object({ code: z.string(), constraint: z.string().optional() });

/** The five-character SQLSTATE of an error that PostgreSQL gave, else null. */
export function sqlState(error: unknown): string | null {
  const parsed = databaseError.safeParse(error);
  return parsed.success && /^[0-9A-Z]{5}$/.test(parsed.data.code) ? parsed.data.code : null;
}

/** The name of the unique index or constraint that a row would have broken, else null. */
export function brokenUnique(error: unknown): string | null {
  const parsed = databaseError.safeParse(error);
  return parsed.success && parsed.data.code === '23505' ? (parsed.data.constraint ?? null) : null;
}

/** 08 connection, 3D no such database (being restored), 53 resources, 55P03 lock, 57 shutdown or timeout, 40 gave up after retries. */
const passing = /^(?:08|3D|53|57|40|55P03)/;
const unreachable = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'EPIPE',
  'ENOENT',
  'ETIMEDOUT',
  'EAI_AGAIN',
  'ENOTFOUND',
]);
const lostConnection =
  /^(?:Connection terminated|timeout exceeded when trying to connect|Client has encountered)/;

/** Did the database not answer, rather than refuse? Then trying again makes sense. */
export function isPassingFailure(error: unknown): boolean {
  if (!(error instanceof Error)) return false;
  if (error.name === 'KnexTimeoutError' || lostConnection.test(error.message)) return true;
  if (error instanceof AggregateError) return error.errors.some(isPassingFailure);
  const parsed = databaseError.safeParse(error);
  return parsed.success && (passing.test(parsed.data.code) || unreachable.has(parsed.data.code));
}
