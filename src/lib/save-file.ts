/** Hands a text to the browser as a file to keep. @throws where the browser keeps none. */
export function saveFile(name: string, text: string, type: 'application/json' | 'text/csv'): void {
  const address = URL.createObjectURL(new Blob([text], { type: `${type};charset=utf-8` }));
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  URL.revokeObjectURL(address);
}
