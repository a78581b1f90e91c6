import { z } from 'zod';

const answer = z.object({ rows: z.array(z.unknown()) });

/** What a raw query found, unread: knex types its answer as anything. */
export function rowsOf(found: unknown): readonly unknown[] {
  return answer.parse(found).rows;
}
