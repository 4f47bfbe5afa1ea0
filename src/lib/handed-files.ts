/** Files dropped on one screen and unpacked on the next: kept for the length of that step only. */
let handed: File[] = [];

export function handFiles(files: File[]): void {
  handed = files;
}
export function takeHandedFiles(): File[] {
  const files = handed;
  handed = [];
  return files;
}
export function hasHandedFiles(): boolean {
  return handed.length > 0;
}
