/** Saves text as a file, by the browser's own download. */
export function saveText(name: string, text: string, type = 'text/plain'): void {
  saveBlob(name, new Blob([text], { type: `${type};charset=utf-8` }));
}

/** Saves bytes as a file. */
export function saveBlob(name: string, blob: Blob): void {
  const address = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  // Firefox reads the blob after the click has returned.
  setTimeout(() => URL.revokeObjectURL(address), 10_000);
}
