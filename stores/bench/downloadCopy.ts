import { keepCopyAsFile } from './keepCopy';

/** Puts a file with everything the shop has not taken into the browser's downloads. What is on the device stays.
 * @returns false when the file could not be made */
export async function downloadCopy(): Promise<boolean> {
  try {
    saveFile(await keepCopyAsFile(), copyName(new Date()));
    return true;
  } catch {
    return false;
  }
}

function saveFile(content: Blob, name: string): void {
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
const copyName = (now: Date): string =>
  `inchwater-unsent-${now.toISOString().slice(0, 16).replace('T', '-').replace(':', '')}.json`;
