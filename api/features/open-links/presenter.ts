import type { StudioOpenLink } from '../../contract/studio-open-link.ts';
import type { Context } from '../../context.ts';
import { OpenLink } from '../../models/OpenLink.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { unsealToken } from './sealed-token.ts';

/** The address to hand on. */
export function lookAddress(config: { address: string }, token: string): string {
  return `${config.address}/look/${token}`;
}

/** The earlier of two ends; null where there is none. */
function earlier(one: Date | null, other: Date | null): Date | null {
  if (!one || !other) return one ?? other;
  return one < other ? one : other;
}

/** The open link of a sheet for the studio; null while it is switched off. */
export async function presentOpenLink(ctx: Context, sheet: Sheet): Promise<StudioOpenLink | null> {
  const link = await OpenLink.within(sheet).where({ sheetId: sheet.id }).whereNull('withdrawnAt').first();
  if (!link) return null;
  const token = link.sealedToken ? unsealToken(ctx.config.secret, sheet.id, link.sealedToken) : undefined;
  const [counted] = await ctx
    .knex('lookers')
    .where({ openLinkId: link.id, round: link.round })
    .where('expiresAt', '>', ctx.knex.fn.now())
    .count<{ count: number | string }[]>();
  const endsAt = earlier(link.endsAt, sheet.endsAt);
  return {
    address: token ? lookAddress(ctx.config, token) : null,
    hasPassphrase: link.passphraseHash !== null,
    endsOn: link.endsOn,
    endsAt: endsAt?.toISOString() ?? null,
    hasEnded: endsAt !== null && endsAt <= new Date(),
    switchedOnAt: link.createdAt.toISOString(),
    lookers: Number(counted?.count ?? 0),
  };
}
