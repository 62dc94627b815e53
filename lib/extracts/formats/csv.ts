import { Transform as CsvTransform } from '@json2csv/node';
import { defineExtractFormat } from './define-extract-format';

/**
 * Comma-separated values (RFC 4180, with line feeds), UTF-8. Cells hold numbers and words of closed lists only, so none can
 * be read as a formula by a spreadsheet; the study's own text never reaches here.
 */
export const csv = defineExtractFormat({
  key: 'csv',
  name: 'Comma-separated values',
  extension: 'csv',
  contentType: 'text/csv; charset=utf-8',
  write: (columns) => new CsvTransform({ fields: [...columns], eol: '\n' }, {}, { objectMode: true }),
});
