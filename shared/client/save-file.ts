/** Saves what the server gave as a file on this device. */
export function saveFile(content: Blob, name: string): void {
  const file = URL.createObjectURL(content);
  const link = document.createElement('a');
  link.href = file;
  link.download = name;
  link.click();
  // The browser has taken it over by then.
  setTimeout(() => URL.revokeObjectURL(file), 10_000);
}
