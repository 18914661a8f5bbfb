import { invalid, type Problem } from '../../middleware/problem.ts';

/** What is known of the person and must not be most of their password. */
export interface Known {
  email?: string;
  names?: string[];
}

const LEAST_OF_ONES_OWN = 6;
let common: Promise<ReadonlySet<string>> | undefined;

/** Some 49,000 passwords in lower case that turned up most often in leaked lists. Read when the first is asked for. */
function commonPasswords(): Promise<ReadonlySet<string>> {
  common ??= import('@zxcvbn-ts/language-common').then(({ dictionary }) => new Set(dictionary['passwords-common'] as string[]));
  return common;
}

/**
 * Why a password would be among the first that somebody tries, in a sentence; undefined where it would not. Kinds of characters are
 * not counted: length and rarity are what helps (ASVS 5.0.0 6.2.4, 6.2.5).
 */
export async function whyGuessable(password: string, known: Known = {}): Promise<string | undefined> {
  const plain = password.toLowerCase();
  const list = await commonPasswords();
  if (list.has(plain) || list.has(coreOf(plain)))
    return 'This is one of the passwords that are tried first. Four or five words that do not belong together make a good one.';
  if (isRepeated(plain) || isRow(plain))
    return 'This is one pattern repeated. Four or five words that do not belong together make a good one.';
  if (isMostlyKnown(plain, known))
    return 'This is mostly your own address or name, which is tried first. Choose something that nobody connects with you.';
  return undefined;
}

/** @throws Problem 422 at the field `password` where the password would be guessed */
export async function refuseGuessable(password: string, known: Known): Promise<void> {
  const why = await whyGuessable(password, known);
  if (why) throw refusal(why);
}

function refusal(message: string): Problem {
  return invalid([{ path: 'password', message }]);
}

/** "liverpool2024!" is "liverpool" with what most people add. */
function coreOf(password: string): string {
  const core = password.replace(/^[^\p{L}]+|[^\p{L}]+$/gu, '');
  return core.length >= 4 ? core : password;
}

/** One piece of up to eight characters, again and again. */
function isRepeated(password: string): boolean {
  return /^(.{1,8}?)\1+$/su.test(password);
}

/** Each character follows the one before, up or down: "abcdefghijkl", "098765432109". */
function isRow(password: string): boolean {
  const points = [...password].map((character) => character.codePointAt(0) ?? 0);
  const steps = points.slice(1).map((point, at) => point - (points[at] ?? 0));
  const follows = (step: number, direction: number) => step === direction || step === -9 * direction;
  return steps.every((step) => follows(step, 1)) || steps.every((step) => follows(step, -1));
}

function isMostlyKnown(password: string, { email = '', names = [] }: Known): boolean {
  const letters = (text: string) => text.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '');
  const own = letters(password);
  const pieces = [email, ...email.split(/[@.+_-]/), ...names, ...names.flatMap((name) => name.split(/\s+/)), 'oriel'].map(letters);
  const words = [...new Set(pieces.filter((piece) => piece.length >= 4))].sort((a, b) => b.length - a.length);
  const rest = words.reduce((left, word) => left.replaceAll(word, ''), own);
  return rest.length < LEAST_OF_ONES_OWN && rest !== own;
}
