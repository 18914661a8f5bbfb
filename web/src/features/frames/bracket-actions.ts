import { useQueryClient, type QueryClient } from '@tanstack/react-query';
import { useMemo } from 'react';
import type { Bracket, BracketList, ChangeBracket, TakenOut } from '../../../../api/contract/brackets.ts';
import type { FrameItem, FramesChanged } from '../../../../api/contract/frames.ts';
import { api } from '../../lib/api.ts';
import { showNotice } from '../../ui/notices.tsx';
import { counted } from '../uploads/upload-words.ts';
import { changeFrames, loadedFrames } from './frame-cache.ts';
import { frameKeys, frameSummaryQuery } from './queries.ts';
import { told } from './told.ts';

const NOUN = { one: 'frame', many: 'frames' };

/** What is decided about brackets by hand. Each shows what came of it, in a notice; none rejects. */
export interface BracketActions {
  join(frames: readonly FrameItem[]): Promise<void>;
  split(bracket: Bracket): Promise<void>;
  takeOut(bracket: Bracket, frameIds: readonly string[]): Promise<void>;
  change(bracket: Bracket, change: ChangeBracket): Promise<void>;
}

/** The brackets of a commission. */
export function useBracketActions(commissionId: string): BracketActions {
  const queries = useQueryClient();
  return useMemo(() => bracketActions(queries, commissionId), [queries, commissionId]);
}

function bracketActions(queries: QueryClient, commissionId: string): BracketActions {
  const key = frameKeys.brackets(commissionId);
  const known = () => queries.getQueryData<BracketList>(key)?.items ?? [];
  const regrouped = (frameIds: readonly string[], bracketId: string | null) => {
    changeFrames(queries, commissionId, frameIds, { bracketId });
    void queries.invalidateQueries({ queryKey: frameSummaryQuery(commissionId).queryKey });
    for (const id of frameIds) void queries.invalidateQueries({ queryKey: frameKeys.one(id) });
    return queries.invalidateQueries({ queryKey: key });
  };

  async function join(frameIds: readonly string[], leadFrameId?: string): Promise<Bracket> {
    const bracket = await api.post<Bracket>(`/api/commissions/${commissionId}/brackets`, { frameIds, leadFrameId });
    // Known before its frames point at it, lest they stand among the single frames for a moment.
    queries.setQueryData<BracketList>(key, (data) => data && { items: [...data.items, bracket] });
    void regrouped(bracket.frameIds, bracket.id);
    return bracket;
  }

  async function split({ id }: Pick<Bracket, 'id'>): Promise<string[]> {
    const { frameIds } = await api.post<FramesChanged>(`/api/brackets/${id}/split`, {});
    await regrouped(frameIds, null);
    return frameIds;
  }

  /** What was split or torn is as it was, under another id. */
  async function rejoin({ frameIds, leadFrameId, shows }: Bracket): Promise<void> {
    const bracket = await join(frameIds, leadFrameId);
    if (bracket.shows !== shows) await change(bracket, { shows });
  }

  async function change({ id }: Bracket, wish: ChangeBracket): Promise<void> {
    const changed = await api.patch<Bracket>(`/api/brackets/${id}`, wish);
    queries.setQueryData<BracketList>(key, (data) => data && { items: data.items.map((one) => (one.id === id ? changed : one)) });
    void regrouped([], null);
  }

  return {
    join: (frames) =>
      told(async () => {
        const ids = frames.map((frame) => frame.id);
        const before = new Set(loadedFrames(queries, commissionId, ids).map((frame) => frame.bracketId));
        const torn = known().filter((bracket) => before.has(bracket.id));
        const bracket = await join(ids);
        const undo = () =>
          void told(async () => {
            await split(bracket);
            for (const one of torn) await rejoin(one);
          });
        showNotice(`${counted(ids.length, NOUN)} joined to a bracket.`, { undo });
      }),

    split: (bracket) =>
      told(async () => {
        const ids = await split(bracket);
        const undo = () => void told(() => rejoin(bracket));
        showNotice(`The bracket is split: ${counted(ids.length, NOUN)} stand alone.`, { undo });
      }),

    takeOut: (bracket, frameIds) =>
      told(async () => {
        const answer = await api.post<TakenOut>(`/api/brackets/${bracket.id}/take-out`, { frameIds });
        await regrouped(answer.frameIds, null);
        const undo = () => void told(() => rejoin(bracket));
        const rest = answer.bracket ? '' : ' No bracket is left.';
        showNotice(`${counted(frameIds.length, NOUN)} taken out of the bracket.${rest}`, { undo });
      }),

    change: (bracket, wish) => told(() => change(bracket, wish)),
  };
}
