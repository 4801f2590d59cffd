/** The files of a drop, those inside folders included; hidden files in folders are left where they are. */
export async function droppedFiles(transfer: DataTransfer): Promise<File[]> {
  // Both are to be asked at once: the browser empties the transfer when the event is over.
  const plain = [...transfer.files];
  const entries = [...transfer.items]
    .filter(({ kind }) => kind === 'file')
    .map((item) => item.webkitGetAsEntry());
  if (!entries.some((entry) => entry?.isDirectory)) return plain;
  const files = await Promise.all(entries.filter((entry) => entry !== null).map(filesIn));
  return files.flat();
}

async function filesIn(entry: FileSystemEntry): Promise<File[]> {
  if (entry.isFile)
    return [await new Promise<File>((found, failed) => (entry as FileSystemFileEntry).file(found, failed))];
  const reader = (entry as FileSystemDirectoryEntry).createReader();
  const inside: FileSystemEntry[] = [];
  for (;;) {
    // Given in parts, an empty one at the end.
    const part = await new Promise<FileSystemEntry[]>((found, failed) => reader.readEntries(found, failed));
    if (part.length === 0) break;
    inside.push(...part);
  }
  inside.sort((a, b) => a.name.localeCompare(b.name, 'en', { numeric: true }));
  const files = await Promise.all(inside.filter(({ name }) => !name.startsWith('.')).map(filesIn));
  return files.flat();
}
