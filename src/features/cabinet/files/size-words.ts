/** "412 bytes", "38 kB", "2.4 MB" of a file, in thousands as disks are sold and files are listed. */
export function sizeWords(bytes: number): string {
  if (bytes < 1000) return bytes === 1 ? '1 byte' : `${bytes} bytes`;
  if (bytes < 999_500) return `${Math.round(bytes / 1000)}\u00a0kB`;
  return `${(bytes / 1e6).toFixed(1)}\u00a0MB`;
}
