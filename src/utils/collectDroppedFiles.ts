export interface NamedFile {
  /** With the folders it lay in. */
  path: string;
  file: File;
}

function readEntries(reader: FileSystemDirectoryReader): Promise<FileSystemEntry[]> {
  return new Promise((resolve, reject) => reader.readEntries(resolve, reject));
}

async function walk(entry: FileSystemEntry): Promise<NamedFile[]> {
  if (entry.isFile) {
    const file = await new Promise<File>((resolve, reject) => (entry as FileSystemFileEntry).file(resolve, reject));
    return [{ path: entry.fullPath.replace(/^\//, ''), file }];
  }
  const reader = (entry as FileSystemDirectoryEntry).createReader();
  const found: NamedFile[] = [];
  // A reader gives its entries in portions, an empty one being the last.
  for (let portion = await readEntries(reader); portion.length > 0; portion = await readEntries(reader)) {
    for (const child of portion) found.push(...(await walk(child)));
  }
  return found;
}

const isHidden = ({ path }: NamedFile): boolean => path.split('/').some((part) => part.startsWith('.'));

/** All files of a drop, folders walked through; hidden files are left out. */
export async function collectDroppedFiles(transfer: DataTransfer): Promise<NamedFile[]> {
  const entries = [...transfer.items].map((item) => item.webkitGetAsEntry()).filter((entry) => entry !== null);
  const found = (await Promise.all(entries.map(walk))).flat();
  return found.filter((file) => !isHidden(file));
}

/** Files of an input field; a chosen folder gives paths. */
export function collectChosenFiles(files: FileList): NamedFile[] {
  return [...files]
    .map((file) => ({ path: file.webkitRelativePath || file.name, file }))
    .filter((file) => !isHidden(file));
}
