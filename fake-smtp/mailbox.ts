import { headerOf, type ReadMessage, readMessage } from './read-message';

/** A message that was taken, with the envelope that it came in. */
export interface TakenMessage extends ReadMessage {
  readonly number: number;
  readonly takenAt: Date;
  readonly envelopeFrom: string;
  readonly envelopeTo: readonly string[];
  readonly raw: string;
}

const mostKept = 500;

/** Keeps the last messages in memory; nothing goes any further. */
export class Mailbox {
  #messages: TakenMessage[] = [];
  #taken = 0;

  take(raw: Buffer, envelope: { readonly from: string; readonly to: readonly string[] }): void {
    this.#taken += 1;
    const message = {
      ...readMessage(raw),
      number: this.#taken,
      takenAt: new Date(),
      envelopeFrom: envelope.from,
      envelopeTo: envelope.to,
      raw: raw.toString('utf8'),
    };
    this.#messages = [...this.#messages, message].slice(-mostKept);
  }

  /** Oldest first. */
  get messages(): readonly TakenMessage[] {
    return this.#messages;
  }

  find(number: number): TakenMessage | undefined {
    return this.#messages.find((message) => message.number === number);
  }

  clear(): void {
    this.#messages = [];
  }
}

export function subjectOf({ headers }: ReadMessage): string {
  return headerOf(headers, 'Subject') ?? '';
}
