const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'] as const;

/** `13 Jun`, for a column where the year is understood. */
export function shortDate(date: Date): string {
  return `${date.getDate()} ${months[date.getMonth()] ?? ''}`;
}
