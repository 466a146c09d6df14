/** Hands a file to the browser's downloads. */
export function saveFile(content: Blob, name: string): void {
  const address = URL.createObjectURL(content);
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  document.body.append(link);
  link.click();
  link.remove();
  // the download has read it by then
  setTimeout(() => URL.revokeObjectURL(address), 60_000);
}

/** "inchwater-unsent-2026-12-01-1042.json" */
export const copyName = (now: Date): string =>
  `inchwater-unsent-${now.toISOString().slice(0, 16).replace('T', '-').replace(':', '')}.json`;
