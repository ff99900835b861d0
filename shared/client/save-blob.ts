/** Saves a file on this device under a name. */
export function saveBlob(blob: Blob, name: string): void {
  const file = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = file;
  link.download = name;
  link.click();
  // The browser has taken it over by then.
  setTimeout(() => URL.revokeObjectURL(file), 10_000);
}
