import { useVirtualizer } from '@tanstack/react-virtual';
import { useMemo, useRef, useState } from 'react';
import { formatBytes } from '../../lib/bytes.ts';
import type { UploadState } from '../../lib/uploads/upload-item.ts';
import type { UploadQueue } from '../../lib/uploads/upload-queue.ts';
import { Button } from '../../ui/button.tsx';
import { Select } from '../../ui/select.tsx';
import { useUpload, useUploadIds, useUploadTotals } from './use-uploads.ts';
import { stateWords } from './upload-words.ts';

const SHOWN: Record<string, UploadState[] | undefined> = {
  all: undefined,
  open: ['held', 'waiting', 'reading', 'sending', 'retrying', 'checking'],
  problems: ['failed', 'left-out', 'known', 'held'],
};
const CHOICES = [
  { value: 'all', words: 'All files' },
  { value: 'open', words: 'Not yet there' },
  { value: 'problems', words: 'Not uploaded' },
];
const ROW = 44;

/** Every file of the upload with where it stands; of thousands only those in sight are in the document. */
export function UploadList({ queue }: { queue: UploadQueue }) {
  const [shown, setShown] = useState('all');
  const ids = useShownIds(queue, SHOWN[shown]);
  const box = useRef<HTMLDivElement>(null);
  const rows = useVirtualizer({ count: ids.length, getScrollElement: () => box.current, estimateSize: () => ROW, overscan: 6 });
  return (
    <div className="mt-3 border-t border-line pt-3">
      <Select aria-label="Files shown" scale="small" choices={CHOICES} value={shown} onChange={(event) => setShown(event.target.value)} />
      <div ref={box} tabIndex={0} role="group" aria-label="Files of this upload" className="mt-2 max-h-72 overflow-y-auto">
        {ids.length === 0 ? <p className="py-2 text-mute">None.</p> : null}
        <ul className="relative" style={{ height: rows.getTotalSize() }}>
          {rows.getVirtualItems().map((row) => {
            const id = ids[row.index];
            return id === undefined ? null : (
              <li
                key={id}
                aria-setsize={ids.length}
                aria-posinset={row.index + 1}
                className="absolute inset-x-0 top-0 border-b border-hair"
                style={{ height: ROW, transform: `translateY(${row.start}px)` }}
              >
                <FileRow queue={queue} id={id} />
              </li>
            );
          })}
        </ul>
      </div>
    </div>
  );
}

function useShownIds(queue: UploadQueue, states: UploadState[] | undefined): readonly string[] {
  const ids = useUploadIds(queue);
  const totals = useUploadTotals(queue);
  return useMemo(() => {
    if (!states) return ids;
    // The totals change whenever a state does, which is all that this list depends on.
    void totals;
    return ids.filter((id) => states.includes(queue.store.view(id)?.state ?? 'waiting'));
  }, [ids, states, queue, totals]);
}

function FileRow({ queue, id }: { queue: UploadQueue; id: string }) {
  const file = useUpload(queue, id);
  if (!file) return null;
  const words = ['done', 'known', 'left-out', 'failed'].includes(file.state) ? 'Clear' : 'Cancel';
  const bad = file.state === 'failed' || file.state === 'retrying';
  return (
    <div className="flex h-full items-center gap-3">
      <div className="min-w-0 flex-1">
        <p className="truncate" title={file.path}>
          {file.path}
        </p>
        {file.problem ? (
          <p className={`truncate text-13 ${bad ? 'text-copper' : 'text-mute'}`} title={file.problem}>
            {file.problem}
          </p>
        ) : null}
      </div>
      <span className="shrink-0 text-13 text-mute">{formatBytes(file.size)}</span>
      <span className={`w-28 shrink-0 text-right text-13 ${bad ? 'font-bold text-copper' : ''}`}>{stateWords(file)}</span>
      <span className="flex w-40 shrink-0 justify-end gap-1">
        {file.state === 'failed' ? (
          <Button size="small" aria-label={`Try again: ${file.name}`} onClick={() => queue.retry(id)}>
            Try again
          </Button>
        ) : null}
        <Button size="small" tone="quiet" aria-label={`${words}: ${file.name}`} onClick={() => queue.cancel(id)}>
          {words}
        </Button>
      </span>
    </div>
  );
}
