import { useTranslation } from 'react-i18next';
import { Link } from 'react-router-dom';
import type { GuestProof, GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { joinClasses } from '../../ui/join-classes.ts';
import { Keystone } from '../../ui/keystone.tsx';
import { Picture } from '../../ui/picture.tsx';
import type { PlaceOfPick, ProofMarks } from '../marks/read-marks.ts';
import { Initials } from './initials.tsx';
import { MarkButton } from './mark-button.tsx';
import { nameOfProof, writeNumber } from './name-of-proof.ts';

interface Props {
  proof: GuestProof;
  view: string;
  marks: ProofMarks;
  place: PlaceOfPick | undefined;
  role: GuestSheet['me']['role'];
  /** Undefined: the sheet cannot be marked now. */
  onMark: ((proof: GuestProof, wanted: boolean) => void) | undefined;
  /** Undefined: the picture leads nowhere, as in a preview. */
  to: string | undefined;
  width: number;
  stacked: boolean;
  /** Its place in the rows, for the arrow keys. */
  position: string;
  eager: boolean;
  onPictureFailed: () => void;
}

/** One proof as it hangs on the sheet: picture, keystone, number, who marked it, and the button to mark it. */
export function ProofCard(props: Props) {
  const { proof, view, marks, place, role, onMark, to, width, stacked, position, eager } = props;
  const { t } = useTranslation();
  const name = nameOfProof(t, { number: proof.number, view, marks, place });
  const picture = (
    <Picture
      source={{ ...proof, ...proof.pictures, thumbhash: proof.placeholder }}
      alt={to ? '' : name}
      drawnWidth={width}
      loading={eager ? 'eager' : 'lazy'}
      onFailed={props.onPictureFailed}
    />
  );
  return (
    <figure className="m-0">
      <div
        className={joinClasses('relative mx-auto', place && 'outline-3 outline-copper', stacked && '-outline-offset-3')}
        style={{ width }}
      >
        {to ? (
          <Link to={to} state={{ fromSheet: true }} aria-label={name} data-position={position} className="block">
            {picture}
          </Link>
        ) : (
          picture
        )}
        {place ? <PickMark place={place} stacked={stacked} /> : null}
        {proof.pictures ? null : <p className="absolute bottom-0 left-0 bg-sheet px-2 text-13">{t('proof.beingMade')}</p>}
      </div>
      <figcaption className={joinClasses('flex items-center justify-between gap-2 py-1.5', stacked && 'px-4 py-2')}>
        <span className="flex min-w-0 items-center gap-2">
          <b>{writeNumber(proof.number)}</b>
          {proof.exposures ? (
            <span title={proof.exposures.says} className="truncate border border-line px-1.5 text-13 text-mute">
              {proof.exposures.says}
            </span>
          ) : null}
        </span>
        <span className="flex shrink-0 items-center gap-2">
          <Initials people={marks.others} most={width < 200 ? 1 : width < 280 ? 2 : 5} />
          {onMark ? (
            <MarkButton
              number={proof.number}
              marks={marks}
              role={role}
              onMark={(wanted) => onMark(proof, wanted)}
              {...(stacked ? { className: 'min-w-22 text-15' } : {})}
            />
          ) : null}
        </span>
      </figcaption>
    </figure>
  );
}

/** The keystone hung from the top edge; on white so that a hatched one is read on any picture. */
function PickMark({ place, stacked }: { place: PlaceOfPick; stacked: boolean }) {
  return (
    <span className="pointer-events-none absolute top-0 left-1/2 -translate-x-1/2">
      <Keystone number={place.number} extra={place.extra} size={stacked ? 'large' : 'normal'} silent />
    </span>
  );
}
