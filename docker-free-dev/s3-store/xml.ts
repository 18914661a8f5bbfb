import { StoreError } from './store-error.ts';

const NAMESPACE = 'http://s3.amazonaws.com/doc/2006-03-01/';

export type XmlContent = string | number | boolean | undefined | XmlChild[];
export type XmlChild = [name: string, content: XmlContent];

const escaped = (text: string): string =>
  // eslint-disable-next-line no-control-regex -- object keys may hold control characters; they go out as references
  text.replace(/[<>&"'\x00-\x1f\x7f]/g, (character) => `&#${character.charCodeAt(0)};`);

function element([name, content]: XmlChild): string {
  if (content === undefined) return '';
  const inside = Array.isArray(content) ? content.map(element).join('') : escaped(String(content));
  return `<${name}>${inside}</${name}>`;
}

/** A whole document; children that are undefined are left out. */
export function document(root: string, children: XmlChild[], namespace = true): string {
  const attribute = namespace ? ` xmlns="${NAMESPACE}"` : '';
  return `<?xml version="1.0" encoding="UTF-8"?>\n<${root}${attribute}>${children.map(element).join('')}</${root}>`;
}

const NAMED = new Map([
  ['lt', '<'],
  ['gt', '>'],
  ['amp', '&'],
  ['quot', '"'],
  ['apos', "'"],
]);

function decodeReference(whole: string, name: string): string {
  const named = NAMED.get(name);
  if (named !== undefined) return named;
  const point = name.startsWith('#x') ? parseInt(name.slice(2), 16) : name.startsWith('#') ? parseInt(name.slice(1), 10) : NaN;
  return point <= 0x10ffff ? String.fromCodePoint(point) : whole;
}

/** Raw inner texts of every element of that name. Requests here are flat lists, so a full parser is not needed. */
export function inner(xml: string, name: string): string[] {
  if (xml.includes('<!')) throw new StoreError(400, 'MalformedXML', 'Declarations and comments are not accepted.');
  const pattern = new RegExp(`<${name}(?:\\s[^>]*)?>([\\s\\S]*?)</${name}>`, 'g');
  return [...xml.matchAll(pattern)].map((match) => match[1] ?? '');
}

/** Decoded text of the first element of that name, or undefined. */
export function text(xml: string, name: string): string | undefined {
  const [first] = inner(xml, name);
  return first?.replace(/&(#x[0-9a-fA-F]+|#[0-9]+|[a-z]+);/g, decodeReference);
}
