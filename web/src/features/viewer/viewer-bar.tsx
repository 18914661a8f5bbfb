import { useTranslation } from 'react-i18next';
import type { GuestProof, GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { formatPrice } from '../../lib/money.ts';
import { Button } from '../../ui/button.tsx';
import { joinClasses } from '../../ui/join-classes.ts';
import { PageTitle } from '../../ui/page-title.tsx';
import type { PlaceOfPick, ProofMarks } from '../marks/read-marks.ts';
import { MarkButton } from '../sheets-guest/mark-button.tsx';
import { writeNumber } from '../sheets-guest/name-of-proof.ts';
import { SurroundMenu } from '../sheets-guest/surround-menu.tsx';
import type { Surround } from '../sheets-guest/surround.ts';
import { GuidesMenu } from './guides-menu.tsx';
import type { Guides } from './guides.ts';

interface Props {
  sheet: GuestSheet;
  proof: GuestProof;
  view: string;
  marks: ProofMarks;
  place: PlaceOfPick | undefined;
  surround: Surround;
  onSurround: (surround: Surround) => void;
  guides: Guides;
  onGuides: (guides: Guides) => void;
  isFull: boolean;
  onFull: () => void;
  onKeys: () => void;
  onClose: () => void;
  onMark: (() => void) | undefined;
}

/** Above the picture: the way back, which proof this is, and what can be done with it. */
export function ViewerBar(props: Props) {
  const { sheet, proof, view, marks, place, surround, onSurround, guides, onGuides, isFull, onFull, onKeys, onClose, onMark } = props;
  const { t } = useTranslation();
  return (
    <header className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2 px-4 py-3 md:flex-nowrap">
      <div className="flex min-w-0 items-center gap-3">
        <Button size="small" className="shrink-0" onClick={onClose}>
          <span aria-hidden="true">←</span> {t('viewer.all')}
        </Button>
        <PageTitle title={t('proof.name', { number: proof.number })} where={sheet.commission.title} className="flex min-w-0 gap-3 text-15">
          <span className="sr-only">{t('proof.name', { number: '' })}</span>
          <span>{writeNumber(proof.number)}</span>
          <span className="truncate font-normal">{view}</span>
        </PageTitle>
      </div>
      <div className="flex shrink-0 items-center gap-2">
        <SurroundMenu surround={surround} onChoose={onSurround} />
        <GuidesMenu guides={guides} onChoose={onGuides} />
        <Button size="small" aria-pressed={isFull} onClick={onFull}>
          {t(isFull ? 'viewer.fit' : 'viewer.full')}
        </Button>
        <Button size="small" className="max-md:hidden" onClick={onKeys}>
          {t('viewer.keys')}
        </Button>
        {onMark ? (
          <MarkButton
            number={proof.number}
            marks={marks}
            role={sheet.me.role}
            onMark={onMark}
            place={place?.number}
            extra={place?.extra ? formatPrice(sheet.extraPrice, sheet.currency) : undefined}
            className="max-md:hidden"
          />
        ) : null}
      </div>
    </header>
  );
}

/** At the side of the picture, where there is room, and below it on a phone. */
export function StepButton({ to, disabled, onClick }: { to: 'previous' | 'next'; disabled: boolean; onClick: () => void }) {
  const { t } = useTranslation();
  return (
    <button
      type="button"
      aria-label={t(`viewer.${to}`)}
      disabled={disabled}
      onClick={onClick}
      className={joinClasses(
        'grid h-11 w-14 place-items-center border border-ink bg-sheet disabled:invisible md:absolute md:top-1/2 md:h-16 md:w-11 md:-translate-y-1/2',
        to === 'previous' ? 'md:left-2.5' : 'md:right-2.5',
      )}
    >
      <svg width="12" height="20" viewBox="0 0 12 20" fill="none" stroke="currentColor" strokeWidth="2" aria-hidden="true">
        <path d={to === 'previous' ? 'M10 2 2 10l8 8' : 'M2 2l8 8-8 8'} />
      </svg>
    </button>
  );
}
