import http from 'node:http';
import { createRequire } from 'node:module';
import type { AddressInfo } from 'node:net';
import express, { type Express, type RequestHandler, type Response } from 'express';
import type { Mailbox } from './mailbox.ts';
import { listPage, mailPage, missingPage, stylesheet } from './page.ts';

const PAGE = 100;
const PAGE_POLICY =
  "default-src 'none'; style-src 'self'; font-src 'self'; img-src data:; frame-src 'self'; base-uri 'none'; form-action 'none'";
/** A caught mail runs no script, sends no form and sees nothing of this page; its links open beside it. */
const MAIL_POLICY =
  "sandbox allow-popups allow-popups-to-escape-sandbox; default-src 'none'; style-src 'unsafe-inline'; img-src data: http: https:; form-action 'none'";

/** Mails hold sign-in links: a page elsewhere that points its own name at 127.0.0.1 must not read them. */
const onlyLoopbackNames: RequestHandler = (req, res, next) => {
  if (['127.0.0.1', 'localhost', '[::1]'].includes(req.hostname)) return next();
  res.status(421).type('text').send('This page answers on 127.0.0.1 and localhost alone.');
};

const pageHeaders: RequestHandler = (_req, res, next) => {
  res.set({
    'content-security-policy': PAGE_POLICY,
    'x-content-type-options': 'nosniff',
    'referrer-policy': 'no-referrer',
    'cache-control': 'no-store',
  });
  next();
};

/** Links of a mail open in a new tab: inside the frame they would be shut in. */
function withNewTabs(content: string): string {
  return `<!doctype html><meta charset="utf-8"><base target="_blank">${content}`;
}

function sendPage(res: Response, page: string, status = 200): void {
  res.status(status).type('html').send(page);
}

function listRoutes(app: Express, mailbox: Mailbox): void {
  app.get('/', (req, res) => {
    const before = typeof req.query.before === 'string' ? req.query.before : null;
    const mails = mailbox
      .all()
      .reverse()
      .filter((mail) => before === null || mail.id < before);
    const page = mails.slice(0, PAGE);
    sendPage(res, listPage(page, mails.length > PAGE ? (page.at(-1)?.id ?? null) : null));
  });
}

function mailRoutes(app: Express, mailbox: Mailbox): void {
  app.get('/mails/:id', (req, res) => {
    const mail = mailbox.find(req.params.id);
    sendPage(res, mail ? mailPage(mail) : missingPage(), mail ? 200 : 404);
  });
  app.get('/mails/:id/html', (req, res) => {
    const mail = mailbox.find(req.params.id);
    if (mail?.html == null) return sendPage(res, missingPage(), 404);
    res.set('content-security-policy', MAIL_POLICY);
    sendPage(res, withNewTabs(mail.html));
  });
  app.get('/mails/:id/source', (req, res) => {
    const mail = mailbox.find(req.params.id);
    if (!mail) return sendPage(res, missingPage(), 404);
    res.type('text').send(mailbox.raw(mail));
  });
}

function fontRoutes(app: Express): void {
  const require = createRequire(import.meta.url);
  for (const weight of [400, 700]) {
    const file = require.resolve(`@fontsource/lato/files/lato-latin-${weight}-normal.woff2`);
    app.get(`/lato-${weight}.woff2`, (_req, res) => res.sendFile(file, { dotfiles: 'allow', maxAge: '1d', cacheControl: true }));
  }
}

export interface RunningPage {
  port: number;
  stop(): Promise<void>;
}

/** Starts the page to read the caught mails on, on 127.0.0.1. */
export async function startPage(mailbox: Mailbox, port: number): Promise<RunningPage> {
  const app = express().disable('x-powered-by');
  app.use(onlyLoopbackNames, pageHeaders);
  app.get('/style.css', (_req, res) => res.type('css').send(stylesheet));
  fontRoutes(app);
  listRoutes(app, mailbox);
  mailRoutes(app, mailbox);
  app.use((_req, res) => sendPage(res, missingPage(), 404));
  const server = http.createServer(app);
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', resolve);
  });
  const stop = async () => {
    const closed = new Promise((resolve) => server.close(resolve));
    server.closeAllConnections();
    await closed;
  };
  return { port: (server.address() as AddressInfo).port, stop };
}
