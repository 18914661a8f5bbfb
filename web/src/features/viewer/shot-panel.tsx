import { useTranslation } from 'react-i18next';
import type { GuestProof } from '../../../../api/contract/guest-sheets.ts';
import { formatAperture, formatFocalLength, formatIso, formatShutter } from '../../../../api/domain/photo-notation.ts';
import { formatWallClock } from '../../lib/dates.ts';
import type { Person } from '../marks/read-marks.ts';

interface Props {
  proof: GuestProof;
  askedFor: string;
  /** Everybody who marked it, oneself included. */
  people: Person[];
  me: string;
}

/** Beside the picture: what was asked for, who marked it, and how it was shot in a photographer's notation. */
export function ShotPanel({ proof, askedFor, people, me }: Props) {
  const { t } = useTranslation();
  const shot = proof.asShot;
  const rows = [
    [t('shot.aperture'), formatAperture(shot.fNumber)],
    [t('shot.shutter'), formatShutter(shot.exposureTime)],
    [t('shot.iso'), formatIso(shot.iso)?.replace('ISO ', '')],
    [t('shot.focalLength'), formatFocalLength(shot.focalLength)],
    [t('shot.taken'), shot.takenLocal ? formatWallClock(shot.takenLocal) : null],
  ].filter(([, value]) => value);
  return (
    <div className="grid content-start gap-5 text-13">
      {askedFor ? (
        <section>
          <h2 className={HEADING}>{t('viewer.askedFor')}</h2>
          <p>{askedFor}</p>
        </section>
      ) : null}
      <section>
        <h2 className={HEADING}>{t('viewer.markedBy')}</h2>
        {people.length === 0 ? <p className="text-mute">{t('viewer.nobody')}</p> : null}
        <ul>
          {people.map((person) => (
            <li key={person.accountId} className="flex justify-between border-b border-hair py-1">
              <span>{person.accountId === me ? t('viewer.you', { name: person.name }) : person.name}</span>
              <span className={person.role === 'lead' ? 'font-bold text-copper' : 'text-mute'}>
                {t(person.role === 'lead' ? 'viewer.picks' : 'viewer.reviews')}
              </span>
            </li>
          ))}
        </ul>
      </section>
      {rows.length > 0 ? (
        <section>
          <h2 className={HEADING}>{t('viewer.asShot')}</h2>
          <dl>
            {rows.map(([label, value]) => (
              <div key={label} className="flex justify-between border-b border-hair py-1">
                <dt>{label}</dt>
                <dd>{value}</dd>
              </div>
            ))}
          </dl>
        </section>
      ) : null}
    </div>
  );
}

const HEADING = 'lettering mb-1.5 border-t border-ink pt-2 font-normal';
