/** Which frames are chosen, where the focus is, and from where a range is drawn. */
export interface Selection {
  chosen: ReadonlySet<string>;
  focus: string | null;
  anchor: string | null;
}

export const NOTHING: Selection = { chosen: new Set(), focus: null, anchor: null };

/** How a frame is chosen: alone, beside the others, or with all from the anchor to it. */
export type Manner = 'alone' | 'also' | 'range';

/** A frame was pressed (or Space was, on it). `order` are the ids as they are shown. */
export function choose(selection: Selection, order: readonly string[], id: string, manner: Manner): Selection {
  if (manner === 'range') return { chosen: new Set(between(order, selection.anchor ?? id, id)), focus: id, anchor: selection.anchor ?? id };
  if (manner === 'alone') return { chosen: new Set([id]), focus: id, anchor: id };
  const chosen = new Set(selection.chosen);
  if (!chosen.delete(id)) chosen.add(id);
  return { chosen, focus: id, anchor: id };
}

/** The focus moves to a frame; with `extend` everything from the anchor to it is chosen. */
export function moveTo(selection: Selection, order: readonly string[], id: string, extend: boolean): Selection {
  if (!extend) return { ...selection, focus: id, anchor: id };
  const anchor = selection.anchor ?? selection.focus ?? id;
  return { chosen: new Set(between(order, anchor, id)), focus: id, anchor };
}

export function chooseAll(selection: Selection, order: readonly string[]): Selection {
  return { ...selection, chosen: new Set(order) };
}

export function chooseNone(selection: Selection): Selection {
  return { ...selection, chosen: new Set(), anchor: selection.focus };
}

/** Leaves out what is not shown any more: what nobody sees must not be deleted with the rest. */
export function keepShown(selection: Selection, order: readonly string[]): Selection {
  const shown = new Set(order);
  const chosen = [...selection.chosen].filter((id) => shown.has(id));
  const still = (id: string | null) => (id !== null && shown.has(id) ? id : null);
  if (
    chosen.length === selection.chosen.size &&
    still(selection.focus) === selection.focus &&
    still(selection.anchor) === selection.anchor
  ) {
    return selection;
  }
  return { chosen: new Set(chosen), focus: still(selection.focus), anchor: still(selection.anchor) };
}

function between(order: readonly string[], one: string, other: string): string[] {
  const [a, b] = [order.indexOf(one), order.indexOf(other)];
  if (a === -1 || b === -1) return [other];
  return order.slice(Math.min(a, b), Math.max(a, b) + 1);
}
