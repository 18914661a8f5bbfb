import type { StoredKind, StudioStorage } from '../../../../api/contract/studios.ts';
import { formatBytes } from '../../lib/bytes.ts';
import { DataTable } from '../../ui/data-table.tsx';

const WORDS: Record<StoredKind['kind'], string> = {
  frames: 'Frames, as they were uploaded',
  finals: 'Finals, every version',
  archives: 'Archives of deliveries and picks',
  uploads: 'Uploads under way',
};

/** What is stored, drawn against the limit as a dimension line, and by kind. */
export function StorageView({ storage }: { storage: StudioStorage }) {
  const { bytes, limitBytes, kinds } = storage;
  const part = Math.min(bytes / limitBytes, 1);
  const scarce = part >= 0.9;
  const percent = part > 0 && part < 0.001 ? 'less than 0.1%' : `${(part * 100).toFixed(1)}%`;
  return (
    <div className="max-w-3xl">
      <p>
        <b className="text-22">{formatBytes(bytes)}</b> of {formatBytes(limitBytes)}, {percent}
      </p>
      <div className="relative mt-2 h-5 border-x border-ink" aria-hidden="true">
        <div className="absolute inset-x-0 top-1/2 border-t border-ink" />
        <div
          className={`absolute top-[7px] left-0 h-[7px] ${scarce ? 'bg-copper' : 'bg-ink'}`}
          style={{ width: `${part * 100}%`, minWidth: bytes > 0 ? 2 : 0 }}
        />
      </div>
      {scarce ? (
        <p className="mt-2 font-bold text-copper">
          {part >= 1 ? 'The room is used up: uploads are refused.' : 'Little room is left.'} Delete frames or commissions that are no longer
          needed.
        </p>
      ) : null}
      <DataTable
        className="mt-6"
        caption="What is stored, by kind"
        rows={kinds}
        rowKey={(row) => row.kind}
        columns={[
          { key: 'kind', words: 'What', cell: (row) => WORDS[row.kind] },
          { key: 'files', words: 'Files', align: 'right', cell: (row) => row.files.toLocaleString('en-GB') },
          { key: 'bytes', words: 'Size', align: 'right', cell: (row) => formatBytes(row.bytes) },
        ]}
      />
      <p className="mt-3 text-13 text-mute">Previews and watermarked proofs can be made again at any time and are not counted.</p>
    </div>
  );
}
