import type { FrameCheck } from '../../api/domain/frame-checks.ts';

export interface UseFinding {
  use: string;
  title: string;
  sharp: boolean;
  /** "sharp", "215 ppi, sharp up to 42 × 28 cm". */
  says: string;
}

/** Another file shows nearly the same. */
export interface AlikeCheck extends Omit<FrameCheck, 'check'> {
  check: 'alike';
}

/** What was found in one file. Units as in the columns of a frame: seconds, millimetres, EV, degrees. */
export interface FileFinding {
  file: string;
  /** Pixels, upright. */
  width: number;
  height: number;
  settings: {
    fNumber: number | null;
    exposureTime: number | null;
    iso: number | null;
    focalLength: number | null;
    focalLength35: number | null;
    /** ISO 8601 with the camera's offset; without one where it wrote none. */
    takenAt: string | null;
    exposureBias: number | null;
    exposureMode: number | null;
    make: string | null;
    model: string | null;
    serial: string | null;
    lens: string | null;
  };
  /** Photographer's notation: "f/11 · 1/125 s · ISO 100 · 35 mm". */
  says: string;
  ev100: number | null;
  /** Stops that the brightest parts of the developed picture are below the limit. */
  headroom: number;
  checks: (FrameCheck | AlikeCheck)[];
  uses: UseFinding[];
}

export interface BracketFinding {
  /** Darkest first. */
  files: string[];
  lead: string;
  says: string;
  /** The merged picture, where it was asked for. */
  merged?: { file: string; says: string };
}

export interface Problem {
  file: string;
  says: string;
}

/** The whole answer, and the JSON of the command; `problems` is there only where there are any. */
export interface Findings {
  files: FileFinding[];
  brackets: BracketFinding[];
  problems?: Problem[];
}
