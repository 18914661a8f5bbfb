import type { CaughtMail } from './mailbox.ts';
import { html, type Markup, withLinks } from './markup.ts';
import { STYLE } from './style.ts';

const clock = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'medium' });

function when(iso: string): Markup {
  return html`<time datetime="${iso}">${clock.format(new Date(iso))}</time>`;
}

function frame(title: string, main: Markup): string {
  const page = html`<!doctype html>
    <html lang="en">
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <title>${title}</title>
        <link rel="icon" href="data:," />
        <link rel="stylesheet" href="/style.css" />
      </head>
      <body>
        <header>
          <h1>Caught mail</h1>
          <p>What Oriel sends on this machine ends here. Nothing is passed on.</p>
        </header>
        <main>${main}</main>
      </body>
    </html>`;
  return page.text;
}

function row(mail: CaughtMail): Markup {
  return html`<li>
    <a href="/mails/${mail.id}"
      ><span class="quiet">${mail.to || mail.envelope.to.join(', ')}</span>
      <span class="subject">${mail.subject || 'No subject'}</span>${when(mail.receivedAt)}</a
    >
  </li>`;
}

/** One page of the list, newest first. @param older id to go on from, null on the last page */
export function listPage(mails: CaughtMail[], older: string | null): string {
  if (mails.length === 0)
    return frame(
      'Caught mail',
      html`<h2>No mail yet</h2>
        <p>A mail appears here the moment Oriel sends it. Load the page again to look.</p>`,
    );
  const more = older === null ? '' : html`<p><a href="/?before=${older}">Older mails</a></p>`;
  return frame(
    'Caught mail',
    html`<ol>
        ${mails.map(row)}
      </ol>
      ${more}`,
  );
}

function body(mail: CaughtMail): Markup {
  const text = html`<h3>Text</h3>
    <pre>${withLinks(mail.text)}</pre>`;
  if (mail.html === null) return text;
  return html`<h3>As a mail program shows it</h3>
    <iframe sandbox="allow-popups allow-popups-to-escape-sandbox" title="The mail's HTML" src="/mails/${mail.id}/html"></iframe>${text}`;
}

function attachments(mail: CaughtMail): Markup | string {
  if (mail.attachments.length === 0) return '';
  const names = mail.attachments.map(({ filename, contentType, size }) => `${filename || 'unnamed'} (${contentType}, ${size} bytes)`);
  return html`<dt>Attached</dt>
    <dd>${names.join(', ')}</dd>`;
}

/** One mail: who and when, HTML in a frame of its own, text, headers. */
export function mailPage(mail: CaughtMail): string {
  const headers = mail.headers.map(({ line }) => line).join('\n');
  return frame(
    mail.subject || 'No subject',
    html`<nav><a href="/">All mails</a><a href="/mails/${mail.id}/source">Raw source</a></nav>
      <h2>${mail.subject || 'No subject'}</h2>
      <dl>
        <dt>From</dt>
        <dd>${mail.from || mail.envelope.from}</dd>
        <dt>To</dt>
        <dd>${mail.to || mail.envelope.to.join(', ')}</dd>
        <dt>Reply to</dt>
        <dd>${mail.replyTo || 'the sender'}</dd>
        <dt>Came</dt>
        <dd>${when(mail.receivedAt)}</dd>
        ${attachments(mail)}
      </dl>
      ${body(mail)}
      <details>
        <summary>Headers</summary>
        <pre class="source">${headers}</pre>
      </details>`,
  );
}

export function missingPage(): string {
  return frame(
    'No such mail',
    html`<h2>No such mail</h2>
      <p>It was removed, or the address is not whole. <a href="/">All mails</a></p>`,
  );
}

export const stylesheet = STYLE;
