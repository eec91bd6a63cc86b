/** A file as it came, with the folder in which it lay; '' where it was dropped by itself. */
export interface DroppedFile {
  file: File;
  folder: string;
}

/** Reads a folder's entries: the browser gives them in portions, and an empty one ends them. */
async function readFolder(reader: FileSystemDirectoryReader): Promise<FileSystemEntry[]> {
  const all: FileSystemEntry[] = [];
  for (;;) {
    const some = await new Promise<FileSystemEntry[]>((resolve, reject) => reader.readEntries(resolve, reject));
    if (some.length === 0) return all;
    all.push(...some);
  }
}

const isFile = (entry: FileSystemEntry): entry is FileSystemFileEntry => entry.isFile;
const isFolder = (entry: FileSystemEntry): entry is FileSystemDirectoryEntry => entry.isDirectory;

async function collectEntry(entry: FileSystemEntry, folder: string): Promise<DroppedFile[]> {
  if (isFile(entry)) return [{ file: await new Promise<File>((resolve, reject) => entry.file(resolve, reject)), folder }];
  if (!isFolder(entry)) return [];
  const below = folder === '' ? entry.name : `${folder}/${entry.name}`;
  const found: DroppedFile[] = [];
  for (const child of await readFolder(entry.createReader())) found.push(...(await collectEntry(child, below)));
  return found;
}

/** Files and folders, with all that is below them, from a drop. To be called while the drop's event is handled: after that the browser has forgotten them. */
export async function collectDrop(transfer: DataTransfer): Promise<DroppedFile[]> {
  const entries = [...transfer.items].filter(({ kind }) => kind === 'file').map((item) => ({ entry: item.webkitGetAsEntry(), file: item.getAsFile() }));
  if (entries.length === 0) return collectChosen(transfer.files);
  const lists = await Promise.all(entries.map(async ({ entry, file }) => (entry ? collectEntry(entry, '') : file ? [{ file, folder: '' }] : [])));
  return lists.flat();
}

/** Files from a file field; one that chooses folders says where each lay. */
export function collectChosen(files: Iterable<File>): DroppedFile[] {
  // Not every browser says where a file lay.
  return [...files].map((file) => ({ file, folder: ((file.webkitRelativePath as string | undefined) ?? '').split('/').slice(0, -1).join('/') }));
}
