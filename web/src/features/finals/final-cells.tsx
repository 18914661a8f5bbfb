import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { FinalItem, FinalList, FinalVersionItem } from '../../../../api/contract/finals.ts';
import { formatTime } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Menu } from '../../ui/menu.tsx';
import { fitLine } from '../uses/fit-words.ts';
import { usesQuery } from '../uses/queries.ts';
import { ChangeFinalDialog } from './change-final-dialog.tsx';
import { sizeWords } from './final-words.ts';
import { useFinalDeed } from './mutations.ts';
import { Thumb } from './thumb.tsx';

/** The newest file of a final: picture, name, size, how many versions there are. Beside its proof the picture waits for room. */
export function FinalCell({ final, besideProof = false }: { final: FinalItem; besideProof?: boolean }) {
  const [newest] = final.versions;
  if (!newest) return null;
  return (
    <span className="flex items-center gap-3">
      <span className={besideProof ? 'hidden xl:block' : 'block'}>
        <Thumb {...newest} picture={newest.pictures?.['480']} />
      </span>
      <span className="min-w-40">
        <b className="block wrap-anywhere">{newest.name}</b>
        <span className="block text-13 text-mute">{sizeWords(newest)}</span>
        <span className="block text-13 text-mute">
          {newest.number > 1 ? `Version ${newest.number}, ` : ''}
          {formatTime(newest.createdAt)}
          {newest.pictures ? '' : ' · pictures being made'}
        </span>
        <Fit {...newest} />
      </span>
    </span>
  );
}

/** What its pixels are enough for. */
function Fit({ width, height }: FinalVersionItem) {
  const uses = useQuery(usesQuery).data?.uses ?? [];
  const words = width > 0 ? fitLine({ width, height }, uses) : '';
  return words ? <span className="block text-13 text-mute">{words}</span> : null;
}

/** Whether the newest version went out, and with which delivery. */
export function DeliveredCell({ final }: { final: FinalItem }) {
  const [newest] = final.versions;
  const numbers = newest?.deliveries ?? [];
  if (numbers.length > 0) return <b className="text-verdigris">{`Delivery ${numbers.join(', ')}`}</b>;
  const earlier = final.versions.some((version) => version.deliveries.length > 0);
  return <span className={earlier ? 'font-bold text-copper' : 'text-mute'}>{earlier ? 'an older version only' : 'not yet'}</span>;
}

/** What can be done to one final. */
export function FinalMenu({ commissionId, final, list }: { commissionId: string; final: FinalItem; list: FinalList }) {
  const [open, setOpen] = useState<'change' | 'versions' | null>(null);
  const deeds = useFinalDeed(commissionId);
  const [newest] = final.versions;
  if (!newest || !list.can.change) return null;
  const close = () => setOpen(null);
  return (
    <>
      <Menu
        label="Change"
        entries={[
          { words: 'Title and pick …', onChoose: () => setOpen('change') },
          { words: `Versions (${final.versions.length}) …`, onChoose: () => setOpen('versions') },
          {
            words: `Remove ${final.versions.length > 1 ? `version ${newest.number}` : 'this final'}`,
            dangerous: true,
            disabled: !newest.can.remove,
            onChoose: () => deeds.mutate({ what: 'remove', version: newest }),
          },
        ]}
      />
      {open === 'change' ? <ChangeFinalDialog commissionId={commissionId} final={final} list={list} onClose={close} /> : null}
      {open === 'versions' ? <VersionsDialog commissionId={commissionId} final={final} onClose={close} /> : null}
    </>
  );
}

function VersionsDialog({ commissionId, final, onClose }: { commissionId: string; final: FinalItem; onClose: () => void }) {
  return (
    <Dialog open wide title={`Versions of ${final.title}`} onClose={onClose}>
      <ul className="divide-y divide-hair">
        {final.versions.map((version) => (
          <VersionRow key={version.id} commissionId={commissionId} version={version} alone={final.versions.length === 1} />
        ))}
      </ul>
      <p className="mt-3 text-13 text-mute">A version that went out with a delivery stays. The newest one is delivered next.</p>
    </Dialog>
  );
}

function VersionRow({ commissionId, version, alone }: { commissionId: string; version: FinalVersionItem; alone: boolean }) {
  const deeds = useFinalDeed(commissionId);
  return (
    <li className="flex list-none flex-wrap items-center gap-x-4 gap-y-2 py-3">
      <Thumb {...version} picture={version.pictures?.['480']} />
      <div className="min-w-0 flex-1 basis-60">
        <p>
          <b>Version {version.number}</b> <span className="wrap-anywhere">· {version.originalName}</span>
        </p>
        <p className="text-13 text-mute">
          {sizeWords(version)} · {formatTime(version.createdAt)}
          {version.deliveries.length > 0 ? ` · in delivery ${version.deliveries.join(', ')}` : ''}
        </p>
        <p className="text-13 break-all text-mute">SHA-256 {version.sha256}</p>
      </div>
      <div className="flex gap-2">
        <Button size="small" disabled={alone} busy={deeds.isPending} onClick={() => deeds.mutate({ what: 'detach', version })}>
          Is another picture
        </Button>
        <Button size="small" tone="danger" disabled={!version.can.remove} onClick={() => deeds.mutate({ what: 'remove', version })}>
          Remove
        </Button>
      </div>
    </li>
  );
}
