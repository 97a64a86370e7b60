/* Files dropped on one sheet and taken by the next: a File lives only in the page's memory. */

let dropped: File[] = [];

export function carry(files: readonly File[]): void {
  dropped = [...files];
}

/** The files carried over, once. */
export function takeCarried(): File[] {
  const files = dropped;
  dropped = [];
  return files;
}
