/** What the search for near-doubles needs of a frame. */
export interface AlikeFrame {
  id: string;
  /** FrameMeasures.hash: 64 bits in hex. */
  hash: string | null;
  /** FrameMeasures.sharpness */
  sharpness: number | null;
  /** Frames of one bracket count as one. */
  bracketId: string | null;
}

/** Frames that show nearly the same. */
export interface AlikeGroup {
  /** In the order they were given; of a bracket, all its frames. */
  frameIds: string[];
  /** Ids of frames of the group; null where fewer than two of it can be compared. */
  sharpest: string | null;
  softest: string | null;
}

function ones(bits: number): number {
  const pairs = bits - ((bits >>> 1) & 0x55555555);
  const fours = (pairs & 0x33333333) + ((pairs >>> 2) & 0x33333333);
  return Math.imul((fours + (fours >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24;
}

/** The two halves of a hash. */
function halves(hash: string): [number, number] {
  return [Number.parseInt(hash.slice(0, 8), 16) | 0, Number.parseInt(hash.slice(8, 16), 16) | 0];
}

/** How many of 64 bits two hashes differ in. */
export function hashDistance(a: string, b: string): number {
  const [[high, low], [otherHigh, otherLow]] = [halves(a), halves(b)];
  return ones(high ^ otherHigh) + ones(low ^ otherLow);
}

/** Sets that grow together: each member knows one of its set nearer to the root. */
class Sets {
  readonly #root: Int32Array;

  constructor(size: number) {
    this.#root = Int32Array.from({ length: size }, (_, at) => at);
  }

  find(of: number): number {
    let at = of;
    while (this.#root[at] !== at) {
      this.#root[at] = this.#root[this.#root[at]!]!;
      at = this.#root[at]!;
    }
    return at;
  }

  /** The earlier root stays one, so that sets keep the order of their first members. */
  join(a: number, b: number): void {
    const [one, other] = [this.find(a), this.find(b)];
    this.#root[Math.max(one, other)] = Math.min(one, other);
  }
}

/** Joins what is alike. Every pair is looked at: 50 million for ten thousand frames, each a few instructions. */
function joinAlike(frames: readonly AlikeFrame[], bits: number, sets: Sets): void {
  const known = frames.flatMap(({ hash }, at) => (hash === null ? [] : [at]));
  const parts = known.map((at) => halves(frames[at]!.hash!));
  const high = Int32Array.from(parts, ([half]) => half);
  const low = Int32Array.from(parts, ([, half]) => half);
  for (let i = 0; i < known.length; i++) {
    for (let j = i + 1; j < known.length; j++) {
      const differing = ones(high[i]! ^ high[j]!);
      if (differing <= bits && differing + ones(low[i]! ^ low[j]!) <= bits) sets.join(known[i]!, known[j]!);
    }
  }
}

function joinBrackets(frames: readonly AlikeFrame[], sets: Sets): void {
  const first = new Map<string, number>();
  frames.forEach(({ bracketId }, at) => {
    if (bracketId === null) return;
    const found = first.get(bracketId);
    if (found === undefined) first.set(bracketId, at);
    else sets.join(found, at);
  });
}

/** Exposures of a bracket are sharp for their brightness: only single frames are compared in sharpness. */
function groupOf(members: readonly AlikeFrame[]): AlikeGroup {
  const measured = members.filter(({ bracketId, sharpness }) => bracketId === null && sharpness !== null);
  const ordered = measured.toSorted((a, b) => b.sharpness! - a.sharpness!);
  const compared = ordered.length >= 2;
  return {
    frameIds: members.map(({ id }) => id),
    sharpest: compared ? ordered[0]!.id : null,
    softest: compared ? ordered.at(-1)!.id : null,
  };
}

/**
 * Groups near-doubles: frames whose hashes differ in at most `bits` of 64, and what is alike with those. Groups and frames come in the
 * order given; a bracket alone is no group, and is alike with another frame where any of its exposures is.
 */
export function findAlike(frames: readonly AlikeFrame[], bits: number): AlikeGroup[] {
  const sets = new Sets(frames.length);
  joinBrackets(frames, sets);
  joinAlike(frames, bits, sets);
  const groups = new Map<number, AlikeFrame[]>();
  frames.forEach((frame, at) => {
    const root = sets.find(at);
    const group = groups.get(root);
    if (group) group.push(frame);
    else groups.set(root, [frame]);
  });
  const units = (members: AlikeFrame[]) => new Set(members.map(({ id, bracketId }) => bracketId ?? id)).size;
  return [...groups.values()].filter((members) => units(members) > 1).map(groupOf);
}
