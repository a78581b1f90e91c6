import { v7 } from 'uuid';

/** A new row's id: UUID version 7, so ids of one table rise with time. `at` dates it when it is not now. */
export function newId(at?: Date): string {
  return at === undefined ? v7() : v7({ msecs: at.getTime() });
}
