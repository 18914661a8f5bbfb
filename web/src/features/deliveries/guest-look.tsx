import { useEffect, useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { GuestDelivery } from '../../../../api/contract/deliveries.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { AnchorButton } from '../../ui/link-button.tsx';
import { sizeWords } from '../finals/final-words.ts';
import { FitForUse } from '../viewer/fit-for-use.tsx';

interface Props {
  files: GuestDelivery['files'];
  uses: GuestDelivery['uses'];
  /** Index of the picture that is looked at. */
  at: number;
  onMove: (at: number) => void;
  onClose: () => void;
}

/** One picture large, on mid grey, with its checksum and what it is good for; arrows lead to the others. */
export function GuestLook({ files, uses, at, onMove, onClose }: Props) {
  const { t } = useTranslation();
  const file = files[at];
  const step = (by: number) => onMove((at + by + files.length) % files.length);
  useArrows(step);
  if (!file) return null;
  return (
    <Dialog
      open
      wide
      title={file.title}
      onClose={onClose}
      actions={
        <>
          <Button size="small" disabled={files.length < 2} onClick={() => step(-1)}>
            {t('delivery.previous')}
          </Button>
          <Button size="small" disabled={files.length < 2} onClick={() => step(1)}>
            {t('delivery.next')}
          </Button>
          <AnchorButton size="small" tone="first" href={file.download} download={file.name}>
            {t('delivery.download')}
          </AnchorButton>
        </>
      }
    >
      <LargePicture key={file.id} file={file} />
      <dl className="mt-3 grid grid-cols-[auto_1fr] gap-x-4 gap-y-1 text-13">
        <dt className="text-mute">{t('delivery.file')}</dt>
        <dd className="break-all">{file.name}</dd>
        <dt className="text-mute">{t('delivery.size')}</dt>
        <dd>{sizeWords(file)}</dd>
        <dt className="text-mute">SHA-256</dt>
        <dd className="break-all">{file.sha256}</dd>
      </dl>
      <div className="mt-4 text-13">
        <FitForUse picture={file} uses={uses} />
      </div>
      <p className="sr-only" aria-live="polite">
        {t('delivery.place', { at: at + 1, of: files.length, title: file.title })}
      </p>
    </Dialog>
  );
}

function LargePicture({ file }: { file: GuestDelivery['files'][number] }) {
  const { t } = useTranslation();
  const [failed, setFailed] = useState(false);
  const address = file.pictures?.['2560'];
  const height = `min(60dvh, ${Math.round((file.height / file.width) * 100)}vw)`;
  return (
    <div className="-mx-5 -mt-4 flex items-center justify-center bg-grey p-3" style={{ minHeight: height }}>
      {address && !failed ? (
        <img
          src={address}
          alt={file.title}
          width={file.width}
          height={file.height}
          className="h-auto max-h-[60dvh] w-auto max-w-full"
          onError={() => setFailed(true)}
        />
      ) : (
        <p className="bg-sheet px-3 py-1">{t('delivery.noPicture')}</p>
      )}
    </div>
  );
}

function useArrows(step: (by: number) => void): void {
  useEffect(() => {
    const hear = (event: KeyboardEvent) => {
      if (event.key === 'ArrowLeft') step(-1);
      if (event.key === 'ArrowRight') step(1);
    };
    window.addEventListener('keydown', hear);
    return () => window.removeEventListener('keydown', hear);
  });
}
