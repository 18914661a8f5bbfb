import { promisify } from 'node:util';
import { gzip } from 'node:zlib';
import { LRUCache } from 'lru-cache';
import type { GuestProof, GuestProofs } from '../../contract/guest-sheets.ts';
import type { Context } from '../../context.ts';
import { problem } from '../../middleware/problem.ts';
import { Sheet } from '../../models/Sheet.ts';
import { View } from '../../models/View.ts';
import { pictureAddress, windowAt } from '../../services/picture-address.ts';
import { type DerivativeSize, proofKey } from '../../services/storage-keys.ts';
import { type BracketExposures, exposuresOfProofs } from '../brackets/count-exposures.ts';
import { exposuresOf, shownPicture } from '../brackets/shown-picture.ts';
import { type ProofWithPicture, proofsInOrder } from '../sheets/presenter.ts';

/** The proofs of a sheet as bytes, plain and compressed: the same for all its guests. */
export interface ProofsBody {
  etag: string;
  plain: Buffer;
  gzipped: Buffer;
}

const compress = promisify(gzip);
const ALSO_MADE = { viewId: null, title: '', askedFor: '' };

/** Bodies by sheet, revision and address window; whatever changes one of them is another body, so nothing here can be stale. */
const bodies = new LRUCache<string, ProofsBody>({
  maxSize: 64 * 1024 * 1024,
  sizeCalculation: (body) => body.plain.length + body.gzipped.length,
});

/** The body of a sheet at its revision of now; asks the database once, for the revision, where the body is known. */
export async function proofsBody(ctx: Context, sheetId: string): Promise<ProofsBody> {
  const sheet = await Sheet.query().findById(sheetId);
  if (!sheet) throw problem(404);
  const key = `${sheetId}/${sheet.revision}/${windowAt(Date.now()).from}`;
  const known = bodies.get(key);
  if (known) return known;
  const plain = Buffer.from(JSON.stringify(await loadGuestProofs(ctx, sheet)));
  const body = { etag: `"${sheet.revision}-${windowAt(Date.now()).from}"`, plain, gzipped: await compress(plain) };
  bodies.set(key, body);
  return body;
}

/** The proofs of a sheet, storey by storey. No file name, no key of an original, no place. */
export async function loadGuestProofs(ctx: Context, sheet: Sheet): Promise<GuestProofs> {
  const [views, proofs] = await Promise.all([
    View.within(sheet).where({ commissionId: sheet.commissionId }).orderBy(['position', 'id']),
    proofsInOrder(sheet),
  ]);
  const exposed = await exposuresOfProofs(ctx.knex, proofs);
  const used = new Set(proofs.map((proof) => proof.viewId));
  const storeys = views.filter((view) => used.has(view.id)).map(({ id, title, askedFor }) => ({ viewId: id, title, askedFor }));
  return {
    revision: sheet.revision,
    storeys: used.has(null) ? [...storeys, ALSO_MADE] : storeys,
    proofs: await Promise.all(
      proofs.map((proof) => presentProof(ctx, sheet, proof, proof.bracketId ? exposed.get(proof.bracketId) : undefined)),
    ),
  };
}

async function presentProof(
  ctx: Context,
  sheet: Sheet,
  proof: ProofWithPicture,
  exposed: BracketExposures | undefined,
): Promise<GuestProof> {
  const { frame, bracket } = proof;
  const shown = shownPicture(frame, bracket);
  const address = (size: DerivativeSize) => pictureAddress(ctx, proofKey(proof, sheet.commissionId, size));
  const ready = proof.watermarkHash !== null && proof.watermarkHash === sheet.watermarkHash;
  return {
    id: proof.id,
    number: proof.number,
    viewId: proof.viewId,
    width: shown.width,
    height: shown.height,
    placeholder: shown.placeholder,
    pictures: ready ? { small: await address(480), medium: await address(960), large: await address(2560) } : null,
    asShot: {
      fNumber: frame.fNumber,
      exposureTime: frame.exposureTime,
      iso: frame.iso,
      focalLength: frame.focalLength,
      takenLocal: frame.takenLocal,
      shutterRange: exposed?.shutterRange ?? null,
      apart: exposed?.apart ?? null,
    },
    exposures: exposuresOf(bracket, exposed?.count ?? 0, shown),
  };
}
