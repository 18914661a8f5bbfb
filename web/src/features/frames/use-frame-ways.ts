import { useCallback, type RefObject } from 'react';
import { useNavigate } from 'react-router-dom';
import type { FrameGridHandle } from './frame-grid.tsx';
import { NOTHING, type Selection } from './selection.ts';

/** In the address of a bracket's lead: its merged picture is shown. */
export const MERGED = '#merged';

/** The ways between the grid and one frame; the wish in the address comes along. */
export function useFrameWays(
  commissionId: string,
  search: string,
  grid: RefObject<FrameGridHandle | null>,
  focus: (selection: Selection) => void,
) {
  const navigate = useNavigate();
  const query = search === '' ? '' : `?${search}`;
  const addressOf = useCallback(
    (frameId: string, merged = false) => `/commissions/${commissionId}/frames/${frameId}${query}${merged ? MERGED : ''}`,
    [commissionId, query],
  );
  const open = useCallback((frameId: string, merged?: boolean) => void navigate(addressOf(frameId, merged)), [navigate, addressOf]);
  const go = useCallback(
    (frameId: string, merged?: boolean) => void navigate(addressOf(frameId, merged), { replace: true }),
    [navigate, addressOf],
  );
  const close = useCallback(
    (frameId: string) => {
      void navigate(`/commissions/${commissionId}/frames${query}`);
      focus({ ...NOTHING, focus: frameId, anchor: frameId });
      // The large view must be gone before a tile below it can take the focus.
      requestAnimationFrame(() => grid.current?.focusFrame(frameId));
    },
    [navigate, commissionId, query, focus, grid],
  );
  return { addressOf, open, outlet: { go, close } };
}
