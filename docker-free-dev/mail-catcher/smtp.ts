import type { AddressInfo, Server, Socket } from 'node:net';
import { SMTPServer, type SMTPServerDataStream, type SMTPServerSession } from 'smtp-server';
import type { Mailbox } from './mailbox.ts';

const LARGEST_MAIL = 25 * 1024 * 1024;

/** What goes wrong with the next mails. */
export interface MailFault {
  /** SMTP code the mail is refused with after its content: 4xx try again, 5xx never. */
  code?: number;
  message?: string;
  /** Keep the mail, then cut the line instead of saying so. */
  loseAnswer?: boolean;
  /** Only mails to an address that contains this. */
  to?: string;
  /** How many mails; 1 where left out. */
  times?: number;
}

/** Switch for tests: makes the next matching mails fail in the way asked for. */
export class MailFaults {
  private waiting: MailFault[] = [];

  failNext(fault: MailFault): void {
    this.waiting.push({ ...fault, times: fault.times ?? 1 });
  }

  clear(): void {
    this.waiting = [];
  }

  take(recipients: string[]): MailFault | undefined {
    const fault = this.waiting.find((one) => recipients.some((address) => address.includes(one.to ?? '')));
    if (!fault) return undefined;
    fault.times = (fault.times ?? 1) - 1;
    if (fault.times <= 0) this.waiting = this.waiting.filter((one) => one !== fault);
    return fault;
  }
}

export interface RunningSmtp {
  port: number;
  stop(): Promise<void>;
}

const refusal = (code: number, message: string) => Object.assign(new Error(message), { responseCode: code });

async function readAll(stream: SMTPServerDataStream): Promise<Buffer> {
  const chunks: Buffer[] = [];
  let bytes = 0;
  for await (const chunk of stream as AsyncIterable<Buffer>) {
    bytes += chunk.length;
    // Read on to the end of an oversized mail, else the client never hears why it was refused.
    if (bytes <= LARGEST_MAIL) chunks.push(chunk);
  }
  if (bytes > LARGEST_MAIL) throw refusal(552, 'The mail is larger than 25 MB.');
  return Buffer.concat(chunks);
}

async function take(mailbox: Mailbox, faults: MailFaults, sockets: Map<number, Socket>, session: SMTPServerSession, raw: Buffer) {
  const to = session.envelope.rcptTo.map((recipient) => recipient.address);
  const from = session.envelope.mailFrom ? session.envelope.mailFrom.address : '';
  const fault = faults.take(to);
  if (fault?.code) throw refusal(fault.code, fault.message ?? 'Refused on purpose.');
  await mailbox.add(raw, { from, to });
  if (fault?.loseAnswer) sockets.get(session.remotePort)?.destroy();
}

/** The net.Server inside; its type declaration leaves the field out. */
const innerServer = (smtp: SMTPServer): Server => (smtp as unknown as { server: Server }).server;

/** Starts an SMTP server on 127.0.0.1 that keeps everything it is sent and passes nothing on. */
export async function startSmtp(mailbox: Mailbox, faults: MailFaults, port: number): Promise<RunningSmtp> {
  const sockets = new Map<number, Socket>();
  const smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    size: LARGEST_MAIL,
    disableReverseLookup: true,
    logger: false,
    onAuth: (auth, _session, done) => done(null, { user: auth.username ?? 'anybody' }),
    onData: (stream, session, done) => {
      readAll(stream)
        .then((raw) => take(mailbox, faults, sockets, session, raw))
        .then(() => done())
        .catch((error: Error) => done(error));
    },
  });
  smtp.on('error', () => undefined);
  innerServer(smtp).on('connection', (socket: Socket) => {
    const { remotePort = 0 } = socket;
    sockets.set(remotePort, socket);
    socket.once('close', () => sockets.delete(remotePort));
  });
  await new Promise<void>((resolve, reject) => {
    innerServer(smtp).once('error', reject);
    smtp.listen(port, '127.0.0.1', () => resolve());
  });
  const stop = async () => {
    const closed = new Promise<void>((resolve) => smtp.close(() => resolve()));
    for (const socket of sockets.values()) socket.destroy();
    await closed;
  };
  return { port: (innerServer(smtp).address() as AddressInfo).port, stop };
}
