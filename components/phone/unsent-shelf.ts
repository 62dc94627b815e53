import type { Shelf, Unsent, UnsentKind } from './unsent';

const name = 'tidemark-unsent';
const table = 'entries';

const settled = <T>(request: IDBRequest<T>): Promise<T> =>
  new Promise((resolve, reject) => {
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error ?? new Error('The device did not keep it.'));
  });

/** Resolves once what was written is on the device, not merely asked for. */
const written = (transaction: IDBTransaction): Promise<void> =>
  new Promise((resolve, reject) => {
    transaction.oncomplete = () => resolve();
    transaction.onabort = () => reject(transaction.error ?? new Error('The device did not keep it.'));
  });

async function open(): Promise<IDBDatabase> {
  const request = indexedDB.open(name, 1);
  request.onupgradeneeded = () => request.result.createObjectStore(table, { keyPath: ['owner', 'kind'] });
  return settled(request);
}

let last: Promise<unknown> = Promise.resolve();

/** One after another, so that a removal never overtakes what was written before it; each with a connection of its own, because phones cut those of pages in the background. */
function inTurn<T>(run: (base: IDBDatabase) => Promise<T>): Promise<T> {
  const mine = async (): Promise<T> => {
    const base = await open();
    try {
      return await run(base);
    } finally {
      base.close();
    }
  };
  // What failed before is its own caller's to hear of.
  const turn = last.then(mine, mine);
  last = turn;
  return turn;
}

function write(change: (entries: IDBObjectStore) => void): Promise<void> {
  return inTurn((base) => {
    const transaction = base.transaction(table, 'readwrite');
    change(transaction.objectStore(table));
    return written(transaction);
  });
}

/** The shelf of this device. Every call rejects where the device offers none, as in some private windows. In the browser only. */
export const deviceShelf: Shelf = {
  all: () => inTurn((base) => settled(base.transaction(table).objectStore(table).getAll() as IDBRequest<Unsent[]>)),
  put: (entry) => write((entries) => void entries.put(entry)),
  remove: (owner: string, kind: UnsentKind) => write((entries) => void entries.delete([owner, kind])),
};
