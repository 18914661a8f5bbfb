import type { FieldErrors, ResolverResult } from 'react-hook-form';
import { Use as UseSchema } from '../../../../api/contract/uses.ts';
import type { Use } from '../../../../api/domain/fit-for-use.ts';

/** What is typed: printed sizes in centimetres, distances in metres, all as text. */
export interface UseFields {
  kind: Use['kind'];
  title: string;
  width: string;
  height: string;
  ppi: string;
  distance: string;
}

export const NEW_USE: UseFields = { kind: 'page', title: '', width: '', height: '', ppi: '300', distance: '' };

/** A use as it is typed. */
export function fieldsOf(use: Use): UseFields {
  const { kind, title } = use;
  if (use.kind === 'screen') return { ...NEW_USE, kind, title, width: String(use.widthPx), height: String(use.heightPx) };
  const sizes = { width: String(use.widthMm / 10), height: use.heightMm === null ? '' : String(use.heightMm / 10) };
  if (use.kind === 'page') return { ...NEW_USE, kind, title, ...sizes, ppi: String(use.ppi) };
  return { ...NEW_USE, kind, title, ...sizes, distance: String(use.distanceMm / 1000) };
}

function numberIn(text: string): number {
  return text.trim() === '' ? NaN : Number(text.replace(',', '.'));
}

/** Millimetres to a thousandth, lest a tenth of a centimetre becomes 0.30000000000000004 of it. */
function millimetres(text: string, factor: number): number {
  return Math.round(numberIn(text) * factor * 1000) / 1000;
}

function written({ kind, title, width, height, ppi, distance }: UseFields, id: string): object {
  if (kind === 'screen') return { id, title, kind, widthPx: numberIn(width), heightPx: numberIn(height) };
  const widthMm = millimetres(width, 10);
  if (kind === 'page') return { id, title, kind, widthMm, heightMm: millimetres(height, 10), ppi: numberIn(ppi) };
  const heightMm = height.trim() === '' ? null : millimetres(height, 10);
  return { id, title, kind, widthMm, heightMm, distanceMm: millimetres(distance, 1000) };
}

const FIELD: Record<string, keyof UseFields> = {
  title: 'title',
  widthMm: 'width',
  widthPx: 'width',
  heightMm: 'height',
  heightPx: 'height',
  ppi: 'ppi',
  distanceMm: 'distance',
};

/** Reads the fields as a use with this id, or says at each field what is wrong with it. */
export function readUse(fields: UseFields, id: string): { use: Use } | { wrong: Partial<Record<keyof UseFields, string>> } {
  const read = UseSchema.safeParse(written(fields, id));
  if (read.success) return { use: read.data };
  const wrong: Partial<Record<keyof UseFields, string>> = {};
  for (const { path, code, message } of read.error.issues) {
    const field = FIELD[String(path[0])];
    if (field) wrong[field] ??= code === 'invalid_type' || code === 'invalid_union' ? 'Write a number.' : message;
  }
  return { wrong };
}

/** The same for a form. */
export function resolveUse(fields: UseFields): ResolverResult<UseFields> {
  const read = readUse(fields, 'checked');
  if ('use' in read) return { values: fields, errors: {} };
  const errors = Object.entries(read.wrong).map(([name, message]) => [name, { type: 'custom', message }]);
  return { values: {}, errors: Object.fromEntries(errors) as FieldErrors<UseFields> };
}
