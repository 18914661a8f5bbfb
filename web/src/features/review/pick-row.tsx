import { useTranslation } from 'react-i18next';
import { Link } from 'react-router-dom';
import type { GuestProof } from '../../../../api/contract/guest-sheets.ts';
import { Button } from '../../ui/button.tsx';
import { Keystone } from '../../ui/keystone.tsx';
import { Picture } from '../../ui/picture.tsx';
import type { PlaceOfPick, ProofMarks } from '../marks/read-marks.ts';
import { Initials } from '../sheets-guest/initials.tsx';
import { nameOfProof, writeNumber } from '../sheets-guest/name-of-proof.ts';

interface Props {
  proof: GuestProof;
  view: string;
  place: PlaceOfPick;
  marks: ProofMarks;
  sheetId: string;
  /** Undefined where it can no longer be taken off, or the pick is another lead's. */
  onTakeOff: (() => void) | undefined;
}

const HEIGHT = 84;
const WIDEST = 132;

/** One pick on the list that is about to be sent, or was. */
export function PickRow({ proof, view, place, marks, sheetId, onTakeOff }: Props) {
  const { t } = useTranslation();
  const width = Math.min(WIDEST, (HEIGHT * proof.width) / proof.height);
  return (
    <li className="flex items-center gap-3 border-b border-hair py-2 md:gap-5">
      <Keystone number={place.number} extra={place.extra} size="small" className="shrink-0" />
      <span className="grid w-20 shrink-0 grid-cols-1 place-items-center sm:w-33">
        <Link
          to={`/sheets/${sheetId}/proofs/${proof.number}`}
          aria-label={nameOfProof(t, { number: proof.number, view, marks, place })}
          className="block"
          style={{ width: `min(100%, ${width}px)` }}
        >
          <Picture source={{ ...proof, ...proof.pictures, thumbhash: proof.placeholder }} alt="" drawnWidth={width} />
        </Link>
      </span>
      <span className="min-w-0 flex-1">
        <b>{writeNumber(proof.number)}</b> {view || t('sheet.alsoMade')}
        {place.extra ? <span className="block text-13 font-bold text-copper">{t('review.extra')}</span> : null}
      </span>
      <span className="max-sm:hidden">
        <Initials people={marks.others} most={4} />
      </span>
      {onTakeOff ? (
        <Button
          size="small"
          tone="quiet"
          aria-label={`${t('review.takeOff')}, ${t('proof.name', { number: proof.number })}`}
          onClick={onTakeOff}
        >
          {t('review.takeOff')}
        </Button>
      ) : null}
    </li>
  );
}
