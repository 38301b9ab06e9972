/** Where the file that the bench's work was made from outlives a reload: one place, as there is one bench. */
const [database, store, place] = ['stepwell', 'originals', 'bench'];

const settled = <Result>(request: IDBRequest<Result>): Promise<Result> =>
  new Promise((resolve, reject) => {
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error ?? new Error('The browser keeps no files.'));
  });

async function opened(): Promise<IDBDatabase> {
  const opening = indexedDB.open(database, 1);
  opening.onupgradeneeded = () => opening.result.createObjectStore(store);
  return settled(opening);
}

/** The file that is kept; null where there is none. Rejects where the browser keeps nothing. */
export async function readKeptFile(): Promise<File | null> {
  const files = await opened();
  try {
    const found: unknown = await settled(files.transaction(store).objectStore(store).get(place));
    return found instanceof File ? found : null;
  } finally {
    files.close();
  }
}

/** Keeps a file in the place of the one before; null leaves none. Rejects where the browser keeps nothing. */
export async function writeKeptFile(file: File | null): Promise<void> {
  const files = await opened();
  try {
    const originals = files.transaction(store, 'readwrite').objectStore(store);
    if (file === null) await settled(originals.delete(place));
    else await settled(originals.put(file, place));
  } finally {
    files.close();
  }
}
