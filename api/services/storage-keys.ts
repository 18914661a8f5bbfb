import { randomUUID } from 'node:crypto';
import type { DerivativeSize } from '../imaging/derivative-sizes.ts';

/** Version of the recipe that derivatives are made by; part of their keys, so that a new recipe never meets an old picture. */
export const RECIPE = 1;

export type { DerivativeSize };

const commission = (studioId: string, commissionId: string) => `studios/${studioId}/commissions/${commissionId}`;

/** Every key of a commission begins so. */
export function commissionPrefix(studioId: string, commissionId: string): string {
  return `${commission(studioId, commissionId)}/`;
}

/** Where the file of an upload is stored, once, byte for byte. Keys hold ids only, never a name that tells something. */
export function originalKey(studioId: string, commissionId: string): string {
  return `${commission(studioId, commissionId)}/originals/${randomUUID()}`;
}

/** A frame's picture without watermark. Longest side in pixels. */
export function frameKey(
  frame: { studioId: string; commissionId: string; id: string; recipe?: number | null },
  size: DerivativeSize,
): string {
  return `${commission(frame.studioId, frame.commissionId)}/pictures/frames/${frame.id}/r${frame.recipe ?? RECIPE}-${size}.jpg`;
}

/** A bracket's merged picture without watermark, named by what it was made of. */
export function mergedKey(
  bracket: { studioId: string; commissionId: string; id: string; madeOf: string | null },
  size: DerivativeSize,
): string {
  return `${commission(bracket.studioId, bracket.commissionId)}/pictures/brackets/${bracket.id}/m${bracket.madeOf ?? ''}-${size}.jpg`;
}

/** A proof's picture with the sheet's watermark, named by that and by what lies below it where that may change. */
export function proofKey(
  proof: { studioId: string; sheetId: string; id: string; watermarkHash: string | null; pictured?: string | null },
  commissionId: string,
  size: DerivativeSize,
): string {
  const name = `w${proof.watermarkHash ?? ''}${proof.pictured ? `-${proof.pictured}` : ''}`;
  return `${commission(proof.studioId, commissionId)}/pictures/sheets/${proof.sheetId}/${proof.id}/${name}-${size}.jpg`;
}

/** A finished file's picture without watermark. */
export function finalKey(
  version: { studioId: string; id: string; recipe?: number | null },
  commissionId: string,
  size: DerivativeSize,
): string {
  return `${commission(version.studioId, commissionId)}/pictures/finals/${version.id}/r${version.recipe ?? RECIPE}-${size}.jpg`;
}

/** A finished file at web size, for deliveries. */
export function webSizeKey(version: { studioId: string; id: string }, commissionId: string): string {
  return `${commission(version.studioId, commissionId)}/web/${version.id}/r${RECIPE}.jpg`;
}

/** Where an archive is written. */
export function archiveKey(studioId: string, commissionId: string): string {
  return `${commission(studioId, commissionId)}/archives/${randomUUID()}.zip`;
}

/** A studio's watermark picture, named by its content. */
export function watermarkKey(studioId: string, sha256: string): string {
  return `studios/${studioId}/watermarks/${sha256}.png`;
}
