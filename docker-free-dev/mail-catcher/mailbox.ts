import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { type AddressObject, type ParsedMail, simpleParser } from 'mailparser';

/** Older mails than these make room for new ones. */
const MOST_MAILS = 2000;

export interface CaughtMail {
  /** Sorts by arrival. */
  id: string;
  /** ISO time with zone */
  receivedAt: string;
  /** Envelope: whom the SMTP client named, which a header need not. */
  envelope: { from: string; to: string[] };
  /** Headers as a person reads them. */
  from: string;
  to: string;
  replyTo: string;
  subject: string;
  text: string;
  /** null where the mail has no HTML part; pictures that came along are inside as data: addresses. */
  html: string | null;
  /** Raw header lines in order, name in lower case. */
  headers: { name: string; line: string }[];
  attachments: { filename: string; contentType: string; size: number }[];
}

const addresses = (given: AddressObject | AddressObject[] | undefined): string =>
  [given]
    .flat()
    .map((one) => one?.text ?? '')
    .filter(Boolean)
    .join(', ');

function describe(id: string, envelope: CaughtMail['envelope'], mail: ParsedMail): CaughtMail {
  return {
    id,
    receivedAt: new Date().toISOString(),
    envelope,
    from: addresses(mail.from),
    to: addresses(mail.to),
    replyTo: addresses(mail.replyTo),
    subject: mail.subject ?? '',
    text: mail.text ?? '',
    html: mail.html || null,
    headers: mail.headerLines.map(({ key, line }) => ({ name: key, line })),
    attachments: mail.attachments.map(({ filename, contentType, size }) => ({ filename: filename ?? '', contentType, size })),
  };
}

/** Mails in a folder: <id>.eml as it came and <id>.json as it reads. The .json is written last and makes it count. */
export class Mailbox {
  private readonly dir: string;
  private caught: CaughtMail[] = [];
  private lastId = '';

  constructor(dir: string) {
    this.dir = dir;
    fs.mkdirSync(dir, { recursive: true, mode: 0o700 });
    const files = new Set(fs.readdirSync(dir));
    for (const file of [...files].sort()) {
      const id = path.basename(file, path.extname(file));
      if (file.endsWith('.json') && files.has(`${id}.eml`)) this.caught.push(this.read(id));
      else if (!(file.endsWith('.eml') && files.has(`${id}.json`)) && /\.(eml|json|new)$/.test(file)) fs.rmSync(path.join(dir, file));
    }
    this.lastId = this.caught.at(-1)?.id ?? '';
  }

  private file(id: string, kind: 'eml' | 'json'): string {
    return path.join(this.dir, `${id}.${kind}`);
  }

  private read(id: string): CaughtMail {
    return JSON.parse(fs.readFileSync(this.file(id, 'json'), 'utf8')) as CaughtMail;
  }

  private write(id: string, kind: 'eml' | 'json', content: string | Buffer): void {
    const draft = `${this.file(id, kind)}.new`;
    fs.writeFileSync(draft, content, { mode: 0o600 });
    fs.renameSync(draft, this.file(id, kind));
  }

  /** Time and chance; a clock that was set back must not put a new mail before an old one. */
  private nextId(): string {
    const now = Date.now().toString().padStart(15, '0');
    const time = now > this.lastId.slice(0, 15) ? now : String(Number(this.lastId.slice(0, 15)) + 1).padStart(15, '0');
    this.lastId = `${time}-${randomBytes(6).toString('hex')}`;
    return this.lastId;
  }

  /** Keeps a mail as it came over the wire. */
  async add(raw: Buffer, envelope: CaughtMail['envelope']): Promise<CaughtMail> {
    const parsed = await simpleParser(raw);
    const mail = describe(this.nextId(), envelope, parsed);
    this.write(mail.id, 'eml', raw);
    this.write(mail.id, 'json', JSON.stringify(mail));
    this.caught.push(mail);
    while (this.caught.length > MOST_MAILS) this.remove(this.caught.shift() as CaughtMail);
    return mail;
  }

  /** Mails in the order they came. */
  all(): CaughtMail[] {
    return [...this.caught];
  }

  find(id: string): CaughtMail | undefined {
    return this.caught.find((mail) => mail.id === id);
  }

  raw(mail: CaughtMail): Buffer {
    return fs.readFileSync(this.file(mail.id, 'eml'));
  }

  private remove({ id }: CaughtMail): void {
    fs.rmSync(this.file(id, 'json'), { force: true });
    fs.rmSync(this.file(id, 'eml'), { force: true });
  }

  clear(): void {
    for (const mail of this.caught) this.remove(mail);
    this.caught = [];
  }
}
