import type { CheckThresholds } from '../../../../api/contract/checks.ts';

export type ThresholdName = keyof CheckThresholds;

/** How one threshold is asked for. */
export interface ThresholdField {
  name: ThresholdName;
  label: string;
  /** Before or after the number: "f/", "%". */
  before?: string;
  unit?: string;
  hint: string;
  /** What may be written; the same limits as in the contract. */
  from: number;
  to: number;
  whole?: boolean;
  /** Its default is what most photographers do; the others are measured or taken from a table. */
  commonPractice: boolean;
}

export interface ThresholdGroup {
  title: string;
  words: string;
  fields: ThresholdField[];
}

/** The thresholds in the order of the form, what is pointed out to be looked at before what is information alone. */
export const THRESHOLD_GROUPS: readonly ThresholdGroup[] = [
  {
    title: 'Highlights and shadows',
    words:
      'Only large areas count: a sky does, a lamp does not. Frames of a bracket are not pointed out, they are meant to be too dark or too bright.',
    fields: [
      {
        name: 'clippedPercent',
        label: 'Highlights clipped from',
        unit: '% of the picture',
        hint: 'Areas at the limit of the scale.',
        from: 0.1,
        to: 100,
        commonPractice: true,
      },
      {
        name: 'blockedPercent',
        label: 'Shadows blocked from',
        unit: '% of the picture',
        hint: 'Areas without any light in them.',
        from: 0.1,
        to: 100,
        commonPractice: true,
      },
    ],
  },
  {
    title: 'Shake',
    words:
      'Pointed out where a frame was taken slower than this, slower than one over its 35 mm equivalent, not from a tripod, and is not sharp.',
    fields: [
      {
        name: 'handSpeed',
        label: 'Held still by anybody at',
        before: '1/',
        unit: 's',
        hint: 'Shorter times are no risk.',
        from: 1,
        to: 8000,
        commonPractice: true,
      },
      {
        name: 'tripodFrom',
        label: 'On a tripod from',
        unit: 's',
        hint: 'Nobody holds a camera that long.',
        from: 0.01,
        to: 60,
        commonPractice: true,
      },
      {
        name: 'sharpFrom',
        label: 'Sharp from',
        unit: 'of measured sharpness',
        hint: 'The variance of the Laplacian on the sharpest parts of the picture.',
        from: 0,
        to: 20,
        commonPractice: false,
      },
    ],
  },
  {
    title: 'Tilt',
    words: 'Measured on straight edges. Where a picture has none, nothing is said.',
    fields: [
      {
        name: 'tiltDegrees',
        label: 'Tilted from',
        unit: 'degrees',
        hint: 'Horizon or uprights off by so much.',
        from: 0.2,
        to: 10,
        commonPractice: true,
      },
      {
        name: 'convergingDegrees',
        label: 'Converging from',
        unit: 'degrees',
        hint: "Uprights that lean in or out at the picture's edge. Information, no alarm.",
        from: 0.2,
        to: 45,
        commonPractice: true,
      },
    ],
  },
  {
    title: 'Unusual settings',
    words: 'Information alone.',
    fields: [
      {
        name: 'apertureFrom',
        label: 'Usual apertures from',
        before: 'f/',
        hint: 'By daylight.',
        from: 0.7,
        to: 90,
        commonPractice: true,
      },
      {
        name: 'apertureTo',
        label: 'Usual apertures to',
        before: 'f/',
        hint: 'By daylight.',
        from: 0.7,
        to: 90,
        commonPractice: true,
      },
      {
        name: 'daylightFrom',
        label: 'Daylight from',
        unit: 'EV at ISO 100',
        hint: 'A heavily overcast day has 12 (ANSI PH2.7-1986); a stop is left for compensation.',
        from: -6,
        to: 20,
        commonPractice: false,
      },
      { name: 'isoAbove', label: 'Noise above', before: 'ISO', hint: '', from: 25, to: 10_000_000, whole: true, commonPractice: true },
    ],
  },
  {
    title: 'Alike',
    words: 'Near-doubles of a commission are shown together, so that one is kept.',
    fields: [
      {
        name: 'alikeBits',
        label: 'Alike up to',
        unit: 'of 64 bits',
        hint: 'So many bits may differ between the hashes of two pictures; with 0 they have to be the same.',
        from: 0,
        to: 20,
        whole: true,
        commonPractice: false,
      },
    ],
  },
];

/** What is wrong with a number, in a sentence. */
export function limitsWords({ from, to, whole }: Pick<ThresholdField, 'from' | 'to' | 'whole'>): string {
  return `${whole ? 'A whole number' : 'A number'} from ${from} to ${to}.`;
}
