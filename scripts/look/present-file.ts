import { DEFAULT_THRESHOLDS } from '../../api/domain/check-thresholds.ts';
import { DEFAULT_USES } from '../../api/domain/default-uses.ts';
import { exposureValue100 } from '../../api/domain/exposure.ts';
import { fitForUse, sayFit } from '../../api/domain/fit-for-use.ts';
import { checkFrame } from '../../api/domain/frame-checks.ts';
import { formatShot } from '../../api/domain/photo-notation.ts';
import type { ShootingSettings } from '../../api/imaging/read-settings.ts';
import type { Examined } from './examine-file.ts';
import type { AlikeCheck, FileFinding, UseFinding } from './findings.ts';

/** "+01:00". */
function sayOffset(minutes: number): string {
  const [hours, rest] = [Math.floor(Math.abs(minutes) / 60), Math.abs(minutes) % 60];
  return `${minutes < 0 ? '-' : '+'}${String(hours).padStart(2, '0')}:${String(rest).padStart(2, '0')}`;
}

function takenAt({ takenLocal, takenOffsetMinutes }: ShootingSettings): string | null {
  if (takenLocal === null || takenOffsetMinutes === null) return takenLocal;
  return takenLocal + sayOffset(takenOffsetMinutes);
}

function usesOf(size: { width: number; height: number }): UseFinding[] {
  return DEFAULT_USES.map((use) => {
    const fit = fitForUse(size, use);
    return { use: use.id, title: use.title, sharp: fit.sharp, says: sayFit(fit) };
  });
}

function settingsOf(read: ShootingSettings): FileFinding['settings'] {
  const { fNumber, exposureTime, iso, focalLength, focalLength35, exposureBias, exposureMode, make, model, serial, lens } = read;
  return {
    ...{ fNumber, exposureTime, iso, focalLength, focalLength35, takenAt: takenAt(read) },
    ...{ exposureBias, exposureMode, make, model, serial, lens },
  };
}

/** Everything that is said about one file. A frame of a bracket is not blamed for what a bracket is for. */
export function presentFile({ file, settings, width, height, measures }: Examined, inBracket: boolean, alike?: AlikeCheck): FileFinding {
  const { fNumber, exposureTime, iso, focalLength, focalLength35 } = settings;
  const ev100 = exposureValue100({ fNumber, seconds: exposureTime, iso });
  return {
    ...{ file, width, height, settings: settingsOf(settings) },
    says: formatShot({ fNumber, seconds: exposureTime, iso, focalLength }),
    ev100: ev100 === null ? null : Number(ev100.toFixed(4)),
    headroom: Number(measures.headroom.toFixed(2)),
    checks: [
      ...checkFrame({ fNumber, exposureTime, iso, focalLength, focalLength35, inBracket }, measures, DEFAULT_THRESHOLDS),
      ...(alike ? [alike] : []),
    ],
    uses: usesOf({ width, height }),
  };
}
