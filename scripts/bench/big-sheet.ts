import { createHash } from 'node:crypto';
import sharp from 'sharp';
import { Account } from '../../api/models/Account.ts';
import { Frame } from '../../api/models/Frame.ts';
import { Proof } from '../../api/models/Proof.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { SheetGuest } from '../../api/models/SheetGuest.ts';
import { View } from '../../api/models/View.ts';
import { originalKey, proofKey, RECIPE } from '../../api/services/storage-keys.ts';
import type { BenchHouse } from './bench-house.ts';

const WATERMARK = 'bench';

/** An open sheet with so many proofs in ten storeys, as rows; with `pictures` their derivatives lie in the store too. */
export async function makeBigSheet(house: BenchHouse, count: number, pictures = false): Promise<{ sheet: Sheet; proofIds: string[] }> {
  const { commission, ctx } = house;
  const { id: commissionId, studioId } = commission;
  const views: View[] = [];
  for (let at = 1; at <= 10; at += 1)
    views.push(await View.query().insertAndFetch({ studioId, commissionId, position: at, title: `View ${at} across the basin` }));
  const rows = Array.from({ length: count }, (_, at) => ({
    studioId,
    commissionId,
    viewId: views[Math.floor((at * 10) / count)]?.id ?? null,
    state: 'ready' as const,
    originalName: `HL_${at}.jpg`,
    name: `HL_${at}.jpg`,
    mediaType: 'image/jpeg',
    sizeBytes: 12_000_000,
    sha256: createHash('sha256').update(`frame ${at}`).digest('hex'),
    storageKey: originalKey(studioId, commissionId),
    width: at % 5 === 0 ? 4000 : 6000,
    height: at % 5 === 0 ? 6000 : 4000,
    placeholder: '2gYKLZRwd3eAiIiIiHiHh3CAB/eI',
    recipe: RECIPE,
    takenLocal: `2026-10-28T${String(10 + Math.floor(at / 3600)).padStart(2, '0')}:${String(Math.floor(at / 60) % 60).padStart(2, '0')}:${String(at % 60).padStart(2, '0')}`,
    fNumber: 11,
    exposureTime: 1 / 125,
    iso: 100,
    focalLength: 35,
  }));
  const frames = await Frame.query().insert(rows).returning(['id', 'viewId', 'width', 'height']);
  const sheet = await Sheet.query().insertAndFetch({
    studioId,
    commissionId,
    number: 1,
    allowance: 12,
    extraPrice: 8500,
    currency: 'GBP',
    watermark: { kind: 'none', text: '', opacity: 0.3, size: 0.5, tiled: false },
    watermarkHash: WATERMARK,
    issuedAt: new Date(),
    endsAt: new Date(Date.now() + 86_400_000 * 14),
    chooseBy: new Date(Date.now() + 86_400_000 * 14).toISOString().slice(0, 10),
  });
  const proofs = await Proof.query()
    .insert(
      frames.map((frame, at) => ({
        studioId,
        sheetId: sheet.id,
        frameId: frame.id,
        viewId: frame.viewId,
        number: at + 1,
        position: at + 1,
        watermarkHash: WATERMARK,
      })),
    )
    .returning('*');
  if (pictures) {
    for (const [at, proof] of proofs.entries()) {
      const { width = 6000, height = 4000 } = frames[at] ?? {};
      for (const size of [480, 960] as const) {
        const scale = size / Math.max(width, height);
        const data = await drawn(Math.round(width * scale), Math.round(height * scale), at);
        await ctx.store.put(proofKey(proof, commissionId, size), data, 'image/jpeg');
      }
    }
  }
  return { sheet, proofIds: proofs.map((proof) => proof.id) };
}

const shades = new Map<string, Promise<Buffer>>();

/** One of twenty noisy pictures of a size: their decoding costs what a photograph's does. */
function drawn(width: number, height: number, at: number): Promise<Buffer> {
  const key = `${width}x${height}/${at % 20}`;
  const known = shades.get(key);
  if (known) return known;
  const noise = { type: 'gaussian' as const, mean: 60 + (at % 20) * 7, sigma: 24 };
  const made = sharp({ create: { width, height, channels: 3, background: '#777777', noise } })
    .blur(1.2)
    .jpeg({ quality: 82 })
    .toBuffer();
  shades.set(key, made);
  return made;
}

/** A guest of a sheet with a session. */
export async function makeBenchGuest(house: BenchHouse, sheet: Sheet, at: number): Promise<{ accountId: string; cookie: string }> {
  const account = await Account.query().insertAndFetch({ email: `guest-${at}@tarn-brandreth.test`, name: `Guest ${at}` });
  await SheetGuest.query().insert({
    studioId: sheet.studioId,
    sheetId: sheet.id,
    accountId: account.id,
    role: at === 0 ? 'lead' : 'reviewer',
    name: account.name,
  });
  return { accountId: account.id, cookie: await house.signIn(account.id, 'guest') };
}
