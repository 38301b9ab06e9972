/** Files that were dropped, those of dropped folders included. */
export async function filesOf(transfer: DataTransfer): Promise<File[]> {
  const entries = Array.from(transfer.items, (item) => item.webkitGetAsEntry()).filter(
    (entry) => entry !== null,
  );
  if (entries.length === 0) return Array.from(transfer.files);
  return (await Promise.all(entries.map(filesUnder))).flat();
}

async function filesUnder(entry: FileSystemEntry): Promise<File[]> {
  if (entry.isFile) {
    return [
      await new Promise<File>((resolve, reject) => (entry as FileSystemFileEntry).file(resolve, reject)),
    ];
  }
  const reader = (entry as FileSystemDirectoryEntry).createReader();
  const found: FileSystemEntry[] = [];
  // A reader gives a hundred entries at a time, and none once it is through.
  for (;;) {
    const some = await new Promise<FileSystemEntry[]>((resolve, reject) =>
      reader.readEntries(resolve, reject),
    );
    if (some.length === 0) break;
    found.push(...some);
  }
  return (await Promise.all(found.map(filesUnder))).flat();
}
