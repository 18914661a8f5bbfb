import { offsetsOf, rowsBetween, wayTo, type RowRange } from './virtual-window.ts';

export interface RowLayout {
  count: number;
  /** The height of a row in CSS pixels before it is drawn. */
  heightOf: (index: number) => number;
  keyOf: (index: number) => string;
  /** A new value makes what was measured worthless: the width of the column. */
  layoutKey: string | number;
}

export interface RowWindowState {
  /** Where each row begins, and where the last one ends. */
  offsets: Float64Array;
  range: RowRange;
}

/** CSS pixels drawn beyond the edges of the window, so that a flick meets rows that are there. */
const BEYOND = 900;
const MARGIN = 16;
const NO_ROWS: RowLayout = { count: 0, heightOf: () => 0, keyOf: String, layoutKey: '' };

/**
 * Which rows of a long list lie near the window, and where. Heights are known before rows are drawn and corrected once they
 * are; what turns out different above the screen moves the window along, so that nothing seen jumps.
 */
export class RowWindow {
  #layout = NO_ROWS;
  #measured = new Map<string, number>();
  #state: RowWindowState = { offsets: new Float64Array(1), range: { first: 0, last: -1 } };
  #list: HTMLElement | null = null;
  readonly #hearers = new Set<() => void>();
  readonly #observer = new ResizeObserver((entries) => {
    for (const { target } of entries) if (target instanceof HTMLElement) this.#read(target);
  });

  listen = (hear: () => void): (() => void) => {
    this.#hearers.add(hear);
    return () => this.#hearers.delete(hear);
  };

  state = (): RowWindowState => this.#state;

  /** The element that is as high as all rows together; null takes it away. */
  attach = (list: HTMLElement | null): (() => void) => {
    this.#list = list;
    window.addEventListener('scroll', this.#look, { passive: true });
    window.addEventListener('resize', this.#look);
    return () => {
      this.#list = null;
      window.removeEventListener('scroll', this.#look);
      window.removeEventListener('resize', this.#look);
    };
  };

  /** Watches the height of a row while it is in the document. */
  watch = (row: HTMLElement | null): (() => void) | undefined => {
    if (!row) return undefined;
    this.#read(row);
    this.#observer.observe(row);
    return () => this.#observer.unobserve(row);
  };

  /** Takes the layout of this drawing; tells only when it moves a row. */
  arrange(layout: RowLayout): void {
    const { count, heightOf, keyOf, layoutKey } = this.#layout;
    // Scrolling draws the list again with the same layout; laying thousands of rows out each time would be felt.
    if (layout.count === count && layout.heightOf === heightOf && layout.keyOf === keyOf && layout.layoutKey === layoutKey) return;
    if (layout.layoutKey !== layoutKey) this.#measured.clear();
    this.#layout = layout;
    this.#lay();
  }

  /** Scrolls as little as possible until a row is on the screen, above a foot of so many CSS pixels. */
  scrollTo(index: number, footHeight: number): void {
    const top = this.#top();
    const way = wayTo(this.#state.offsets, index, top + MARGIN, top + window.innerHeight - footHeight - MARGIN);
    if (way !== 0) window.scrollBy({ top: way, behavior: 'instant' });
  }

  /** How much of the list has gone out at the top of the window. */
  #top(): number {
    return -(this.#list?.getBoundingClientRect().top ?? 0);
  }

  #lay(): void {
    const { count, heightOf, keyOf } = this.#layout;
    const offsets = offsetsOf(count, (index) => this.#measured.get(keyOf(index)) ?? heightOf(index));
    const isSame = offsets.length === this.#state.offsets.length && offsets.every((offset, at) => offset === this.#state.offsets[at]);
    if (!isSame) this.#tell({ offsets, range: this.#rangeIn(offsets) });
  }

  #tell(state: RowWindowState): void {
    this.#state = state;
    this.#hearers.forEach((hear) => hear());
  }

  #rangeIn(offsets: Float64Array): RowRange {
    const top = this.#top();
    return rowsBetween(offsets, top, top + window.innerHeight, BEYOND);
  }

  #look = (): void => {
    const range = this.#rangeIn(this.#state.offsets);
    if (range.first === this.#state.range.first && range.last === this.#state.range.last) return;
    this.#tell({ ...this.#state, range });
  };

  #read(row: HTMLElement): void {
    const index = Number(row.dataset.index);
    const { offsets } = this.#state;
    const before = (offsets[index + 1] ?? 0) - (offsets[index] ?? 0);
    const now = row.offsetHeight;
    if (now === 0 || Math.abs(now - before) < 1) return;
    const isAbove = (offsets[index + 1] ?? 0) < this.#top();
    this.#measured.set(row.dataset.key ?? '', now);
    this.#lay();
    if (isAbove) window.scrollBy({ top: now - before, behavior: 'instant' });
  }
}
