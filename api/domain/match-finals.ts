import { splitExtension } from './file-names.ts';

/** A pick as matching sees it: the names of its frame or frames, and the wall-clock times they were taken at. */
export interface MatchablePick {
  id: string;
  names: readonly string[];
  /** As the camera wrote them, e.g. "2026-11-14 16:12:03.25"; empty where unknown. */
  taken: readonly string[];
}

/** A finished file as it came in. */
export interface MatchableFinal {
  name: string;
  taken: string | null;
}

/** Why a match is not sure. */
export type Doubt = 'several' | 'weak-name' | 'time-contradicts' | 'time-only' | 'nothing-alike';

/** The pick a final belongs to, or the question to ask with the picks that come into consideration, likeliest first. */
export type FinalMatch = { kind: 'matched'; pickId: string } | { kind: 'ask'; doubt: Doubt; candidates: string[] };

/** Fewer letters and digits than this name nothing: "1.jpg" is in every folder. */
const MIN_STEM = 4;
/** Exporters drop the fraction of a second, so times within one agree. */
const SAME_TIME_MS = 1000;

type Agreement = 'agrees' | 'unknown' | 'contradicts';

/** Letters and digits of a name without its extension, everything else as single separators, ignoring case. */
function stemOf(name: string): string {
  const [stem] = splitExtension(name.normalize('NFKC'));
  return stem
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, ' ')
    .trim();
}

/** The same kind of character on both sides of a cut means the word or number goes on: 0412 is not in 04123. */
function goesOn(left: string | undefined, right: string | undefined): boolean {
  if (!left || !right) return false;
  return (/\p{N}/u.test(left) && /\p{N}/u.test(right)) || (/\p{L}/u.test(left) && /\p{L}/u.test(right));
}

/** Where `part` stands in `whole` as whole words and numbers; -1 where it does not. */
function wordIndex(whole: string, part: string): number {
  for (let at = whole.indexOf(part); at >= 0 && part !== ''; at = whole.indexOf(part, at + 1)) {
    if (!goesOn(whole[at - 1], part[0]) && !goesOn(part.at(-1), whole[at + part.length])) return at;
  }
  return -1;
}

interface NameLikeness {
  length: number;
  sure: boolean;
}

/**
 * How much of a pick's name stands in the final's. The whole stem counts fully; it is sure when both names are equal, or
 * it begins the final's name and is long enough, or it stands later and bears a number. A common last number alone
 * ("0412_final" for IMG_0412) is a hint to ask about, never a match.
 */
function nameLikeness(final: string, frame: string): NameLikeness | null {
  const at = wordIndex(final, frame);
  if (at >= 0) {
    const length = frame.replaceAll(' ', '').length;
    const telling = length >= MIN_STEM && (at === 0 || /\p{N}{3}/u.test(frame));
    return { length, sure: final === frame || telling };
  }
  const number = /\p{N}{3,}$/u.exec(frame)?.[0];
  return number && wordIndex(final, number) >= 0 ? { length: 0, sure: false } : null;
}

/** Wall-clock time as milliseconds on a scale of its own, in no zone. */
function clock(taken: string): number {
  return Date.parse(
    `${taken
      .trim()
      .replace(' ', 'T')
      .replace(/(\.\d{3})\d+/, '$1')}Z`,
  );
}

function timeAgreement(final: string | null, taken: readonly string[]): Agreement {
  const own = final ? clock(final) : NaN;
  const known = taken.map(clock).filter((one) => !Number.isNaN(one));
  if (Number.isNaN(own) || known.length === 0) return 'unknown';
  return known.some((one) => Math.abs(one - own) < SAME_TIME_MS) ? 'agrees' : 'contradicts';
}

interface Candidate {
  id: string;
  name: NameLikeness | null;
  time: Agreement;
}

const TIME_ORDER: Record<Agreement, number> = { agrees: 0, unknown: 1, contradicts: 2 };

function likeliestFirst(a: Candidate, b: Candidate): number {
  return (b.name?.length ?? -1) - (a.name?.length ?? -1) || TIME_ORDER[a.time] - TIME_ORDER[b.time];
}

function candidateOf(final: MatchableFinal, stem: string, pick: MatchablePick): Candidate {
  const names = pick.names.map((name) => nameLikeness(stem, stemOf(name))).filter((one) => one !== null);
  const best = names.sort((a, b) => b.length - a.length || Number(b.sure) - Number(a.sure))[0] ?? null;
  return { id: pick.id, name: best, time: timeAgreement(final.taken, pick.taken) };
}

/** Of picks whose names fit equally well, the one whose time says so; undefined where that is not exactly one. */
function singled(best: readonly Candidate[]): Candidate | undefined {
  if (best.length === 1) return best[0];
  const agreeing = best.filter((one) => one.time === 'agrees');
  const othersContradict = best.every((one) => one.time !== 'unknown');
  return agreeing.length === 1 && othersContradict ? agreeing[0] : undefined;
}

function doubtAbout(best: readonly Candidate[], chosen: Candidate | undefined, all: readonly Candidate[]): Doubt | null {
  if (all.length === 0) return 'nothing-alike';
  if (best.length === 0) return 'time-only';
  if (!chosen) return 'several';
  if (!chosen.name?.sure) return 'weak-name';
  const timeSpeaksForAnother = chosen.time !== 'agrees' && all.some((one) => one !== chosen && one.time === 'agrees');
  return chosen.time === 'contradicts' || timeSpeaksForAnother ? 'time-contradicts' : null;
}

/**
 * Finds the pick a finished file belongs to, by the longest common stem of their names and by capture time
 * (IMG_0412.jpg <- IMG_0412_final-v2.tif). What is not sure is asked, never guessed: two picks that fit equally well, a
 * stem that names nothing, a time that contradicts the name, a time alone, or nothing alike.
 */
export function matchFinal(final: MatchableFinal, picks: readonly MatchablePick[]): FinalMatch {
  const stem = stemOf(final.name);
  const all = picks
    .map((pick) => candidateOf(final, stem, pick))
    .filter((one) => one.name !== null || one.time === 'agrees')
    .sort(likeliestFirst);
  const longest = all[0]?.name?.length;
  const best = longest === undefined ? [] : all.filter((one) => one.name?.length === longest);
  const chosen = singled(best);
  const doubt = doubtAbout(best, chosen, all);
  if (!doubt && chosen) return { kind: 'matched', pickId: chosen.id };
  return { kind: 'ask', doubt: doubt ?? 'several', candidates: all.map((one) => one.id) };
}
