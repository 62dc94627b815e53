import { csv } from './csv';
import type { ExtractFormat } from './define-extract-format';

/** Every format of an extract, alphabetical by key. */
export const extractFormats: readonly ExtractFormat[] = [csv];
