import type { SheetMarks } from '../../../../api/contract/guest-sheets.ts';

type Marks = SheetMarks['marks'];

interface Wish {
  wanted: boolean;
  /** What the server last confirmed, to fall back to. */
  confirmed: boolean;
}

interface Dealings {
  /** Sends one wish; rejects where it was refused. */
  send: (proofId: string, marked: boolean) => Promise<unknown>;
  /** Told after a wish was confirmed; the wish is shown until it is through. */
  onSaved: (proofId: string, marked: boolean) => void | Promise<void>;
  /** Told after a wish was refused and the mark fell back. */
  onRefused: (proofId: string, marked: boolean, error: unknown) => void;
}

/**
 * Holds the marks that are wanted and not confirmed yet, so that a mark is seen at once. Each proof has one request under
 * way at a time: whoever marks, unmarks and marks again sends the last wish, never an older one after it.
 */
export class MarkKeeper {
  #wishes = new Map<string, Wish>();
  #snapshot: ReadonlyMap<string, boolean> = new Map();
  readonly #hearers = new Set<() => void>();

  constructor(private readonly dealings: Dealings) {}

  listen = (hear: () => void): (() => void) => {
    this.#hearers.add(hear);
    return () => this.#hearers.delete(hear);
  };

  /** The wishes under way, by proof; the same object until one changes. */
  wishes = (): ReadonlyMap<string, boolean> => this.#snapshot;

  /** Wants a proof marked or not. `now` is what the server has as far as the page knows. */
  want(proofId: string, wanted: boolean, now: boolean): void {
    const under = this.#wishes.get(proofId);
    if (under) under.wanted = wanted;
    else if (wanted !== now) {
      this.#wishes.set(proofId, { wanted, confirmed: now });
      void this.#settle(proofId);
    }
    this.#tell();
  }

  async #settle(proofId: string): Promise<void> {
    const wish = this.#wishes.get(proofId);
    if (!wish) return;
    const sent = wish.wanted;
    try {
      await this.dealings.send(proofId, sent);
      wish.confirmed = sent;
      await this.dealings.onSaved(proofId, sent);
    } catch (error) {
      wish.wanted = wish.confirmed;
      this.dealings.onRefused(proofId, sent, error);
    }
    if (wish.wanted !== wish.confirmed) return this.#settle(proofId);
    this.#wishes.delete(proofId);
    this.#tell();
  }

  #tell(): void {
    this.#snapshot = new Map([...this.#wishes].map(([proofId, { wanted }]) => [proofId, wanted]));
    this.#hearers.forEach((hear) => hear());
  }
}

/** The marks with one person's mark on one proof set or taken away. */
export function withMark(marks: Marks, proofId: string, accountId: string, marked: boolean): Marks {
  const others = marks.filter((mark) => mark.proofId !== proofId || mark.accountId !== accountId);
  return marked ? [...others, { proofId, accountId }] : others;
}

/** The server's marks with the wishes under way laid over them. */
export function withWishes(marks: Marks, wishes: ReadonlyMap<string, boolean>, me: string): Marks {
  let seen = marks;
  for (const [proofId, marked] of wishes) seen = withMark(seen, proofId, me, marked);
  return seen;
}
