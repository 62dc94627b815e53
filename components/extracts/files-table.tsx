import type { ExtractView } from '@/lib/extracts/view-extract';
import { formatCount, formatNumber } from '../ui/format';
import { PlainTable } from '../ui/plain-table';

const sizeWords = (bytes: number): string => (bytes < 1024 ? `${formatCount(bytes)} B` : bytes < 1024 * 1024 ? `${formatNumber(bytes / 1024, 1)} KB` : `${formatNumber(bytes / 1024 / 1024, 1)} MB`);

/** The files with rows, size and checksum; saving one is written to the trail. */
export function FilesTable({ extract, mayDownload }: { extract: Pick<ExtractView, 'id' | 'files'>; mayDownload: boolean }) {
  return (
    <PlainTable
      caption="Files of this extract"
      rows={extract.files}
      getRowId={({ name }) => name}
      columns={[
        { id: 'name', header: 'File', cell: ({ name }) => <b>{name}</b> },
        { id: 'rows', header: 'Rows', numeric: true, cell: ({ name, rowCount }) => (name === 'checksums.txt' ? '' : formatCount(rowCount)) },
        { id: 'size', header: 'Size', numeric: true, cell: ({ byteCount }) => sizeWords(byteCount) },
        { id: 'sum', header: 'SHA-256', cell: ({ sha256 }) => <span className="t-num text-[12.5px] [overflow-wrap:anywhere]">{sha256}</span> },
        ...(mayDownload
          ? [
              {
                id: 'save',
                header: 'Save',
                headerHidden: true,
                cell: ({ name }: { name: string }) => (
                  <a className="btn-link" href={`/api/extracts/${extract.id}/files/${name}`} download>
                    Save<span className="sr-only"> {name}</span>
                  </a>
                ),
              },
            ]
          : []),
      ]}
    />
  );
}
