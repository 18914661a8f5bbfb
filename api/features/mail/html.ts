import type { Letter } from './layout.ts';
import { t } from './words.ts';

/** Text as HTML shows it, in elements and in attributes. */
export function escapeHtml(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;').replaceAll("'", '&#39;');
}

const P = 'margin:0 0 16px';
const SMALL = 'margin:0 0 8px;font-size:13px;line-height:18px';

const lines = (text: string) => escapeHtml(text).replaceAll('\n', '<br>');
const paragraph = (text: string) => `<p style="${P}">${lines(text)}</p>`;

function quoteOf(quote: Letter['quote']): string {
  if (!quote?.words.trim()) return '';
  return (
    `<p style="${SMALL}">${escapeHtml(quote.by)}:</p>` +
    `<blockquote style="margin:0 0 16px;padding:0 0 0 12px;border-left:2px solid #777777">${lines(quote.words.trim())}</blockquote>`
  );
}

function factsOf(facts: Letter['facts'] = []): string {
  if (facts.length === 0) return '';
  const cells = facts.map(
    (fact) =>
      `<div style="padding:8px 12px;border-top:1px solid #777777"><span style="display:block;font-size:13px;line-height:18px">` +
      `${escapeHtml(fact.label)}</span><b>${escapeHtml(fact.value)}</b></div>`,
  );
  return `<div style="margin:0 0 20px;border:1px solid #777777;border-top:0">${cells.join('')}</div>`;
}

/** The frame of the button takes the colour of the text, so that it is seen in light and in dark. */
function actionOf(action: Letter['action']): string {
  if (!action) return '';
  const address = escapeHtml(action.address);
  return (
    `<p style="margin:24px 0 16px"><a href="${address}" style="display:inline-block;padding:12px 20px;border:2px solid;color:inherit;` +
    `font-weight:bold;text-decoration:none">${escapeHtml(action.words)}</a></p>` +
    `<p style="${SMALL}">${escapeHtml(t('layout.plainLink'))}<br><a href="${address}" style="color:inherit;word-break:break-all">${address}</a></p>`
  );
}

/**
 * The HTML form: one column without tables that fits 320 px, and no background of its own, so that a mail program's dark mode has
 * nothing to spoil. Styles stand at the elements, since mail programs drop style sheets.
 */
export function htmlOf(letter: Letter, foot: string[]): string {
  const head = escapeHtml(letter.studioName ?? 'Oriel');
  const body = [
    `<p style="margin:0 0 24px;padding:0 0 12px;border-bottom:1px solid #777777;font-size:17px;font-weight:bold">${head}</p>`,
    letter.greeting ? paragraph(letter.greeting) : '',
    ...letter.paragraphs.map(paragraph),
    quoteOf(letter.quote),
    factsOf(letter.facts),
    actionOf(letter.action),
    ...(letter.after ?? []).map(paragraph),
    '<div style="margin:32px 0 0;padding:12px 0 0;border-top:1px solid #777777">',
    ...foot.map((line) => `<p style="${SMALL}">${lines(line)}</p>`),
    '</div>',
  ];
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<meta name="supported-color-schemes" content="light dark">
<title>${escapeHtml(letter.subject)}</title>
</head>
<body style="margin:0;padding:0">
<div style="max-width:560px;margin:0 auto;padding:20px 16px;font-family:Lato,Helvetica,Arial,sans-serif;font-size:15px;line-height:22px;overflow-wrap:anywhere">
${body.filter(Boolean).join('\n')}
</div>
</body>
</html>
`;
}
