/** Hands a blob to the browser as a download under `fileName`. */
export function saveBlob(blob: Blob, fileName: string): void {
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = fileName;
  document.body.append(link);
  link.click();
  link.remove();
  // Some browsers read the blob after the click handler has returned.
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}
