const pad = (value: number) => String(value).padStart(2, '0');

/** A moment as the value of a `datetime-local` field, in the reader's own time zone, to the minute. */
export function localFieldFromDate(date: Date): string {
  const day = `${date.getFullYear()}-${pad(date.getMonth() + 1)}-${pad(date.getDate())}`;
  return `${day}T${pad(date.getHours())}:${pad(date.getMinutes())}`;
}

/** The moment that a `datetime-local` field names, as ISO 8601 in UTC; '' when it names none. */
export function isoFromLocalField(text: string): string {
  const date = new Date(text);
  return text === '' || Number.isNaN(date.getTime()) ? '' : date.toISOString();
}

/** The same of a field that may be empty: null where it names no moment. */
export function isoFromOptionalField(text: string): string | null {
  const moment = isoFromLocalField(text);
  return moment === '' ? null : moment;
}
