/** Hands bytes to the browser's own download, under the name they came with. */
export function saveFile(bytes: Blob, fileName: string): void {
  const url = URL.createObjectURL(bytes);
  const link = document.createElement('a');
  link.href = url;
  link.download = fileName;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}
