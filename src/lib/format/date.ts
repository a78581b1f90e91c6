import { monthNames } from '../../../shared/words';

const weekdays = ['Sunday', 'Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday'] as const;

const two = (value: number): string => String(value).padStart(2, '0');

/** `16 June 2026`, in the reader's own time zone. */
export function formatDate(date: Date): string {
  return `${date.getDate()} ${monthNames[date.getMonth()] ?? ''} ${date.getFullYear()}`;
}

/** `16 Jun`, where the year is plain from the place. */
export function formatShortDate(date: Date): string {
  return `${date.getDate()} ${(monthNames[date.getMonth()] ?? '').slice(0, 3)}`;
}

/** `Tuesday`, in the reader's own time zone. */
export function formatWeekday(date: Date): string {
  return weekdays[date.getDay()] ?? '';
}

/** `1 day`, `12 days`. */
export function formatDays(count: number): string {
  return count === 1 ? '1 day' : `${count} days`;
}

/** `Tuesday 16 June 2026`. */
export function formatLongDate(date: Date): string {
  return `${formatWeekday(date)} ${formatDate(date)}`;
}

/** `17:20`. */
export function formatTime(date: Date): string {
  return `${two(date.getHours())}:${two(date.getMinutes())}`;
}

/** `10:42:07`. */
export function formatTimeExact(date: Date): string {
  return `${formatTime(date)}:${two(date.getSeconds())}`;
}

const dayNumber = (date: Date): number =>
  Math.round(Date.UTC(date.getFullYear(), date.getMonth(), date.getDate()) / 86_400_000);

/** Whole calendar days from `earlier` to `later`, as the reader's own calendar counts them. */
export function daysBetween(earlier: Date, later: Date): number {
  return dayNumber(later) - dayNumber(earlier);
}

/** When something happened, from where the reader stands: `today 10:42`, `yesterday 17:20`, `4 May 17:20`, `4 May 2025`. */
export function formatMoment(date: Date, now: Date): string {
  const days = daysBetween(date, now);
  if (days === 0) return `today ${formatTime(date)}`;
  if (days === 1) return `yesterday ${formatTime(date)}`;
  if (date.getFullYear() !== now.getFullYear()) return formatDate(date);
  return `${date.getDate()} ${monthNames[date.getMonth()] ?? ''} ${formatTime(date)}`;
}
