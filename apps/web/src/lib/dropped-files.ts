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

/** What a drop holds, and the names of what the browser could not read of it. */
export interface Dropped {
  files: DroppedFile[];
  unreadable: string[];
}

async function collectEntry(entry: FileSystemEntry, folder: string, dropped: Dropped): Promise<void> {
  const path = folder === '' ? entry.name : `${folder}/${entry.name}`;
  try {
    if (isFile(entry)) dropped.files.push({ file: await new Promise<File>((resolve, reject) => entry.file(resolve, reject)), folder });
    else if (isFolder(entry)) for (const child of await readFolder(entry.createReader())) await collectEntry(child, path, dropped);
  } catch {
    dropped.unreadable.push(path);
  }
}

/** Files and folders, with all that is below them, from a drop. To be called while the drop's event is handled: after that the browser has forgotten them. */
export async function collectDrop(transfer: DataTransfer): Promise<Dropped> {
  const entries = [...transfer.items].filter(({ kind }) => kind === 'file').map((item) => ({ entry: item.webkitGetAsEntry(), file: item.getAsFile() }));
  const dropped: Dropped = { files: entries.length === 0 ? collectChosen(transfer.files) : [], unreadable: [] };
  for (const { entry, file } of entries) {
    if (entry) await collectEntry(entry, '', dropped);
    else if (file) dropped.files.push({ file, folder: '' });
  }
  return dropped;
}

/** Files from a file field; one that chooses folders says where each lay. */
export function collectChosen(files: Iterable<File>): DroppedFile[] {
  // Not every browser says where a file lay.
  return [...files].map((file) => ({ file, folder: ((file.webkitRelativePath as string | undefined) ?? '').split('/').slice(0, -1).join('/') }));
}
