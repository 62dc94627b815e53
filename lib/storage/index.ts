import { env, type StorageSettings } from '@/lib/env';
import { folderStorage } from './folder-storage';
import { s3Storage } from './s3-storage';
import type { Storage } from './storage';

export { FileMissing, type FileHead, type Storage } from './storage';

export function makeStorage(settings: StorageSettings): Storage {
  return settings.kind === 'folder' ? folderStorage(settings.path) : s3Storage(settings);
}

let shared: Storage | undefined;

/** The store that STORAGE names. */
export function storage(): Storage {
  shared ??= makeStorage(env().STORAGE);
  return shared;
}
