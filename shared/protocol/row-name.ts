/** A row as a person finds it: its number from 1, and its label if it has one. */
export function rowName(index: number, label: string): string {
  return label.trim() === '' ? `Row ${index + 1}` : `Row ${index + 1} (${label.trim()})`;
}
