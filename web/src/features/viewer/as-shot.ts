import type { GuestProof } from '../../../../api/contract/guest-sheets.ts';
import { formatAperture, formatFocalLength, formatIso, formatShutter } from '../../../../api/domain/photo-notation.ts';
import { formatWallClock } from '../../lib/dates.ts';

type Shot = Pick<GuestProof, 'asShot' | 'exposures'>;
export type ShotFact = 'exposures' | 'aperture' | 'shutter' | 'iso' | 'focalLength' | 'taken';

/** "5, 2 stops apart, merged"; "4 of 5, merged" where one was left out and the steps are not known. */
function sayExposures({ exposures, asShot }: Shot): string | null {
  if (!exposures) return null;
  const [number, how] = exposures.says.split(' exposures').map((part) => part.trim());
  return [number, asShot.apart, how].filter(Boolean).join(', ');
}

/** "1/8 s to 30 s" for what was merged, the frame's own time else. `to` joins the two in the reader's language. */
function sayShutter({ exposures, asShot }: Shot, to: (fastest: string, slowest: string) => string): string | null {
  const range = exposures?.merged ? asShot.shutterRange : null;
  const [fastest, slowest] = [formatShutter(range?.fastest), formatShutter(range?.slowest)];
  return fastest && slowest && fastest !== slowest ? to(fastest, slowest) : formatShutter(asShot.exposureTime);
}

/** How a proof was shot, in a photographer's notation; what is not known is left out. */
export function shotFacts(shot: Shot, to: (fastest: string, slowest: string) => string): { fact: ShotFact; says: string }[] {
  const { fNumber, iso, focalLength, takenLocal } = shot.asShot;
  const facts: [ShotFact, string | null | undefined][] = [
    ['exposures', sayExposures(shot)],
    ['aperture', formatAperture(fNumber)],
    ['shutter', sayShutter(shot, to)],
    ['iso', formatIso(iso)?.replace('ISO ', '')],
    ['focalLength', formatFocalLength(focalLength)],
    ['taken', takenLocal ? formatWallClock(takenLocal) : null],
  ];
  return facts.flatMap(([fact, says]) => (says ? [{ fact, says }] : []));
}
