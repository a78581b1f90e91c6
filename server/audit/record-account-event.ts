import type { Knex } from 'knex';
import { newId } from '../db/new-id';

interface AccountEvent {
  readonly kind: 'signed-in' | 'sign-in-failed' | 'signed-out' | 'signed-out-everywhere' | 'refused';
  readonly userId: string | null;
  /** Words of ours, never of a provider or a client. */
  readonly detail: string;
  readonly requestId: string;
}

/** What concerns a person's account rather than a lab: kept for ever, in no lab's chain. */
export async function recordAccountEvent(database: Knex, event: AccountEvent): Promise<void> {
  await database('account_events').insert({
    id: newId(),
    kind: event.kind,
    user_id: event.userId,
    detail: event.detail,
    request_id: event.requestId,
  });
}
