/** A camera's file name taken apart: "HL_0412.jpg" is number 412 of "HL_", and a ".jpg". */
export interface FileNumber {
  before: string;
  number: number | null;
  extension: string;
  /** Whether it looks as a camera named it: some letters and four digits (DCF, JEITA CP-3461). */
  byCamera: boolean;
}

const NAMED_BY_CAMERA = /^[A-Za-z0-9_]{1,5}\d{4}$/;
const PARTS = /^(.*?)(\d{1,9})(\D*)$/s;

/** Takes the last number of a file name, as cameras count there. */
export function fileNumber(name: string): FileNumber {
  const dot = name.lastIndexOf('.');
  const [stem, extension] = dot < 0 ? [name, ''] : [name.slice(0, dot), name.slice(dot + 1).toLowerCase()];
  const [, before = stem, digits, after = ''] = PARTS.exec(stem) ?? [];
  return {
    before: `${before}\n${after}`,
    number: digits === undefined ? null : Number(digits),
    extension,
    byCamera: NAMED_BY_CAMERA.test(stem),
  };
}

/** Order within one row of numbers; otherwise by letters. */
export function compareNumbers(one: FileNumber, two: FileNumber): number {
  if (one.before !== two.before) return one.before < two.before ? -1 : 1;
  return (one.number ?? 0) - (two.number ?? 0);
}

/** How many files later the second was written by the same counter; null where they are of different rows. */
export function filesBetween(one: FileNumber, two: FileNumber): number | null {
  if (one.before !== two.before || one.number === null || two.number === null) return null;
  // Cameras go on with 0000 or 0001 after 9999.
  return one.number > 9900 && one.number < 10_000 && two.number < 100 ? two.number + 10_000 - one.number : two.number - one.number;
}

/** Between two frames of a bracket no counter goes further. */
const FAR = 100;

/** Whether the names come from the counters of two cameras; names that people or telephones give say nothing. */
export function ofTwoCounters(one: FileNumber, two: FileNumber): boolean {
  if (!one.byCamera || !two.byCamera) return false;
  const files = filesBetween(one, two);
  return files === null || Math.abs(files) > FAR;
}
