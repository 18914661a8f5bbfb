import type { Context } from '../../api/context.ts';
import { Mail } from '../../api/models/Mail.ts';

/** Secrets of the links that were mailed, by address. */
export type MailedTokens = ReadonlyMap<string, string>;

/**
 * Does something that mails links, and gives the secrets of those links. Only the mails have them, and the worker blots them
 * out once a mail is on its way, so they are read before the transaction ends.
 */
export async function mailedTokens(ctx: Context, act: (within: Context) => Promise<unknown>): Promise<MailedTokens> {
  return ctx.knex.transaction(async (trx) => {
    await act({ ...ctx, knex: trx });
    // Within a transaction now() stands still: these are the mails of this one.
    const mails = await Mail.query(trx).where('createdAt', trx.raw('now()'));
    return new Map(
      mails.flatMap(({ toAddress, text }) => {
        const token = /\/(?:open|join|confirm-email)\/([\w-]{20,})/.exec(text)?.[1];
        return token ? [[toAddress, token] as const] : [];
      }),
    );
  });
}

/** The secret of the one link that was mailed to this address. */
export async function mailedToken(ctx: Context, address: string, act: (within: Context) => Promise<unknown>): Promise<string> {
  return tokenFor(await mailedTokens(ctx, act), address);
}

export function tokenFor(tokens: MailedTokens, address: string): string {
  const token = tokens.get(address);
  if (!token) throw new Error(`No link was mailed to ${address}.`);
  return token;
}
