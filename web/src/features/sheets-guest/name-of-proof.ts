import type { TFunction } from 'i18next';
import type { PlaceOfPick, ProofMarks } from '../marks/read-marks.ts';

interface Named {
  number: number;
  /** The words of its view; empty for "Also made". */
  view: string;
  marks: ProofMarks;
  place: PlaceOfPick | undefined;
}

/** The spoken name of a picture: "Proof 7, East front across the basin, dusk, picked". */
export function nameOfProof(t: TFunction, { number, view, marks, place }: Named): string {
  const state = place?.extra ? t('proof.pickedExtra') : place ? t('proof.picked') : marks.mine ? t('proof.marked') : '';
  return [t('proof.name', { number }), view || t('sheet.alsoMade'), state].filter(Boolean).join(', ');
}

/** Two digits at least, as sheets are numbered: 07, 128. */
export function writeNumber(number: number): string {
  return String(number).padStart(2, '0');
}
