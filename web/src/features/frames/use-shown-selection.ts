import { useMemo, useState } from 'react';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { keepShown, NOTHING, type Selection } from './selection.ts';

/** The selection among what is shown now, and the chosen frames in their order. */
export function useShownSelection(shown: readonly FrameItem[]): [Selection, (next: Selection) => void, FrameItem[]] {
  const [kept, setKept] = useState(NOTHING);
  const order = useMemo(() => shown.map((frame) => frame.id), [shown]);
  const selection = useMemo(() => keepShown(kept, order), [kept, order]);
  const chosen = useMemo(() => shown.filter((frame) => selection.chosen.has(frame.id)), [shown, selection.chosen]);
  return [selection, setKept, chosen];
}
