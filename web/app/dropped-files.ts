/** The files of a drop: loose ones together, and each folder for itself, without its subfolders. */

/** Files that belong together, and what to say of folders that gave none. */
export interface Dropped {
  readonly groups: readonly (readonly File[])[];
  readonly notices: readonly { readonly name: string; readonly message: string }[];
}

/** Must be called while the drop is being handled: its entries are gone afterwards. */
export async function droppedFiles(transfer: DataTransfer): Promise<Dropped> {
  const entries = [...transfer.items].filter((item) => item.kind === 'file').map((item) => ({ entry: item.webkitGetAsEntry(), file: item.getAsFile() }));
  const loose: File[] = [];
  const groups: File[][] = [];
  const notices: { name: string; message: string }[] = [];
  for (const { entry, file } of entries) {
    if (entry === null || entry.isFile) {
      if (file !== null) loose.push(file);
      continue;
    }
    try {
      const files = await filesOfFolder(entry as FileSystemDirectoryEntry);
      if (files.length > 0) groups.push(files);
      else notices.push(emptyFolder(entry.name));
    } catch (error) {
      notices.push({ name: entry.name, message: `The folder could not be read: ${error instanceof Error ? error.message : String(error)}` });
    }
  }
  return { groups: loose.length > 0 ? [loose, ...groups] : groups, notices };
}

/** The same for a folder chosen with a button: the browser lists all files below it. */
export function chosenFolder(files: readonly File[]): Dropped {
  const direct = files.filter((file) => file.webkitRelativePath.split('/').length <= 2);
  if (direct.length > 0) return { groups: [direct.filter(isVisible)], notices: [] };
  const [first] = files;
  return { groups: [], notices: first === undefined ? [] : [emptyFolder(first.webkitRelativePath.split('/')[0] ?? 'The folder')] };
}

function emptyFolder(name: string): { name: string; message: string } {
  return { name, message: 'The folder itself holds no files, and its subfolders are not read; open the folder that the scans lie in.' };
}

async function filesOfFolder(folder: FileSystemDirectoryEntry): Promise<File[]> {
  const reader = folder.createReader();
  const files: File[] = [];
  // A reader hands out its entries in parts and says with an empty one that it is done.
  for (;;) {
    const part = await new Promise<FileSystemEntry[]>((resolve, reject) => { reader.readEntries(resolve, reject); });
    if (part.length === 0) return files.filter(isVisible);
    const inside = part.filter((entry): entry is FileSystemFileEntry => entry.isFile);
    files.push(...await Promise.all(inside.map((entry) => new Promise<File>((resolve, reject) => { entry.file(resolve, reject); }))));
  }
}

/** Names that start with a dot are the system's own notes. */
function isVisible(file: File): boolean {
  return !file.name.startsWith('.');
}
