import nodemailer from 'nodemailer';
import { z } from 'zod';
import type { Config } from '../config.ts';

/** A mail as it is handed to the mail server. */
export interface Letter {
  /** The same mail has the same one whenever it is handed over, so that a second copy can be told from a second mail. */
  messageId: string;
  to: { address: string; name: string };
  fromName: string;
  replyTo: string | null;
  subject: string;
  text: string;
  html: string;
}

/**
 * What came of it. later: the server did not take it, and may another time. never: it will not. unsure: the whole mail was handed over
 * and no answer came, so it may be on its way.
 */
export type Outcome = { is: 'sent' } | { is: 'later' | 'never' | 'unsure'; problem: string };

const SECONDS = 1000;
const Address = z.email().max(254);

/** Hands one mail to the server of ORIEL_SMTP_URL. Never throws for what the server or the network does. */
export async function handOver(config: Config, letter: Letter): Promise<Outcome> {
  const wrong = [letter.to.address, ...(letter.replyTo ? [letter.replyTo] : [])].find((address) => !Address.safeParse(address).success);
  if (wrong !== undefined) return { is: 'never', problem: 'The address is not one that mails can go to.' };
  const watch = watchHandOver();
  const transport = nodemailer.createTransport({
    url: config.mail.url,
    connectionTimeout: 15 * SECONDS,
    greetingTimeout: 15 * SECONDS,
    socketTimeout: 60 * SECONDS,
    logger: watch.logger,
    // Words come from people: they name neither files nor addresses for the library to fetch.
    disableFileAccess: true,
    disableUrlAccess: true,
  });
  try {
    await transport.sendMail({
      from: { name: oneLine(letter.fromName), address: config.mail.from },
      to: { name: oneLine(letter.to.name), address: letter.to.address },
      ...(letter.replyTo ? { replyTo: letter.replyTo } : {}),
      subject: oneLine(letter.subject),
      text: letter.text,
      html: letter.html,
      messageId: letter.messageId,
      // RFC 3834 5: no answering machine should answer.
      headers: { 'Auto-Submitted': 'auto-generated' },
    });
    return { is: 'sent' };
  } catch (error) {
    return outcomeOf(error, watch.wholeMailGone());
  } finally {
    transport.close();
  }
}

/** What would end a line of the header becomes a space. */
function oneLine(text: string): string {
  return text.replace(/\p{Cc}+/gu, ' ').trim();
}

/**
 * A lost connection tells nothing of how far the mail had come. The library's log does: it notes the end of the message, and before that
 * point the server must not deliver (RFC 5321 4.1.1.4).
 */
function watchHandOver() {
  let gone = false;
  const ignore = () => undefined;
  const info = (entry: unknown) => {
    if (typeof entry === 'object' && entry !== null && 'outByteCount' in entry) gone = true;
  };
  const logger = { level: ignore, trace: ignore, debug: ignore, info, warn: ignore, error: ignore, fatal: ignore };
  return { logger, wholeMailGone: () => gone };
}

interface SmtpError {
  code?: string;
  responseCode?: number;
  response?: string;
}

const LOCAL: Record<string, string> = {
  EDNS: 'The name of the mail server was not found.',
  ECONNECTION: 'The mail server closed the connection.',
  ESOCKET: 'The mail server could not be reached.',
  ETIMEDOUT: 'The mail server did not answer in time.',
  ETLS: 'No safe connection to the mail server could be made.',
  EAUTH: 'The mail server refused our sign-in.',
};

function outcomeOf(error: unknown, wholeMailGone: boolean): Outcome {
  const { code = '', responseCode, response } = (error ?? {}) as SmtpError;
  if (responseCode !== undefined) {
    const said = `The mail server said: ${oneLine(response ?? String(responseCode)).slice(0, 300)}`;
    // A wrong password of ours is nothing that this mail is to blame for.
    return { is: responseCode >= 500 && code !== 'EAUTH' ? 'never' : 'later', problem: said };
  }
  if (code === 'EENVELOPE' || code === 'EMESSAGE') return { is: 'never', problem: 'The mail server takes no such mail.' };
  if (wholeMailGone) return { is: 'unsure', problem: 'The connection broke after the mail was handed over. It may have gone out.' };
  return { is: 'later', problem: LOCAL[code] ?? 'The mail could not be handed over.' };
}
