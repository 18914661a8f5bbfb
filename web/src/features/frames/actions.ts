import { useQueryClient, type QueryClient } from '@tanstack/react-query';
import { useMemo } from 'react';
import type { FrameItem, FramesChanged, FramesChangedExcept } from '../../../../api/contract/frames.ts';
import type { SheetSummary, StudioSheet } from '../../../../api/contract/sheets.ts';
import { api, ApiProblem } from '../../lib/api.ts';
import { showNotice } from '../../ui/notices.tsx';
import { sheetKeys } from '../sheets/queries.ts';
import { counted } from '../uploads/upload-words.ts';
import { changeFrames, loadedFrames, removeFrames, writeFrames } from './frame-cache.ts';
import { asProofsWords } from './bracket-words.ts';
import { frameKeys, frameSummaryQuery } from './queries.ts';
import { told } from './told.ts';

/** The API takes at most so many at once. */
const AT_ONCE = 1000;
const NOUN = { one: 'frame', many: 'frames' };

/** What can be done with chosen frames. Each shows what came of it, in a notice; none rejects. */
export interface FrameActions {
  hide(ids: readonly string[], hidden: boolean): Promise<void>;
  hang(ids: readonly string[], view: { id: string; title: string } | null): Promise<void>;
  /** @returns whether all of them are gone */
  remove(ids: readonly string[]): Promise<boolean>;
  /**
   * Brings deleted frames back.
   * @returns whether all of them are back
   */
  restore(frames: readonly FrameItem[]): Promise<boolean>;
  putOnSheet(ids: readonly string[], sheet: SheetSummary | null): Promise<void>;
}

/** The actions of a commission's frames. */
export function useFrameActions(commissionId: string): FrameActions {
  const queries = useQueryClient();
  return useMemo(() => frameActions(queries, commissionId), [queries, commissionId]);
}

function frameActions(queries: QueryClient, commissionId: string): FrameActions {
  const path = `/api/commissions/${commissionId}/frames`;
  const post = <T extends FramesChanged>(verb: string, ids: readonly string[], more: object = {}) =>
    inPortions(ids, (frameIds) => api.post<T>(`${path}/${verb}`, { frameIds, ...more }));
  const changed = (ids: readonly string[]) => {
    void queries.invalidateQueries({ queryKey: frameSummaryQuery(commissionId).queryKey });
    void queries.invalidateQueries({ queryKey: frameKeys.deleted(commissionId) });
    for (const id of ids) void queries.invalidateQueries({ queryKey: frameKeys.one(id) });
  };

  async function setHidden(ids: readonly string[], hidden: boolean): Promise<string[]> {
    const answers = await post(hidden ? 'hide' : 'show', ids);
    changeFrames(queries, commissionId, ids, { hidden });
    const touched = answers.flatMap((answer) => answer.frameIds);
    changed(touched);
    return touched;
  }

  async function hangAll(ids: readonly string[], viewId: string | null): Promise<void> {
    await post('hang', ids, { viewId });
    changeFrames(queries, commissionId, ids, { viewId });
    changed(ids);
  }

  async function restore(frames: readonly FrameItem[]): Promise<number> {
    const answers = await post<FramesChangedExcept>(
      'restore',
      frames.map((frame) => frame.id),
    );
    const back = new Set(answers.flatMap((answer) => answer.frameIds));
    writeFrames(
      queries,
      commissionId,
      frames.filter((frame) => back.has(frame.id)),
    );
    changed([...back]);
    tellRefused(answers, 'was not brought back');
    return back.size;
  }

  return {
    hide: (ids, hidden) =>
      told(async () => {
        const touched = await setHidden(ids, hidden);
        if (touched.length === 0) return;
        const undo = () => void told(async () => void (await setHidden(touched, !hidden)));
        showNotice(hidden ? `${counted(touched.length, NOUN)} hidden.` : `${counted(touched.length, NOUN)} shown again.`, { undo });
      }),

    hang: (ids, view) =>
      told(async () => {
        const before = byView(loadedFrames(queries, commissionId, ids));
        await hangAll(ids, view?.id ?? null);
        const undo = () =>
          void told(async () => {
            for (const [viewId, frameIds] of before) await hangAll(frameIds, viewId);
          });
        const where = view ? `hung under “${view.title}”` : 'under no view now';
        showNotice(`${counted(ids.length, NOUN)} ${where}.`, { undo });
      }),

    remove: async (ids) => {
      let allGone = false;
      await told(async () => {
        const frames = loadedFrames(queries, commissionId, ids);
        const answers = await post<FramesChangedExcept>('delete', ids);
        const gone = answers.flatMap((answer) => answer.frameIds);
        removeFrames(queries, commissionId, gone);
        changed(gone);
        const known = new Set(gone);
        const undo = () => void told(async () => void (await restore(frames.filter((frame) => known.has(frame.id)))));
        if (gone.length > 0) showNotice(`${counted(gone.length, NOUN)} deleted.`, { undo });
        tellRefused(answers, 'was kept');
        allGone = gone.length === ids.length;
      });
      return allGone;
    },

    restore: async (frames) => {
      let back = 0;
      await told(async () => {
        back = await restore(frames);
        if (back > 0) showNotice(`${counted(back, NOUN)} brought back.`);
      });
      return back === frames.length;
    },

    putOnSheet: (ids, sheet) =>
      told(async () => {
        const target = await putAll(commissionId, ids, sheet);
        void queries.invalidateQueries({ queryKey: sheetKeys.lists(commissionId) });
        void queries.invalidateQueries({ queryKey: sheetKeys.one(target.id) });
        const what = asProofsWords(loadedFrames(queries, commissionId, ids));
        showNotice(`${what} put on sheet ${target.number}: it has ${counted(target.proofCount, PROOF)} now.`);
      }),
  };
}

function byView(frames: readonly FrameItem[]): Map<string | null, string[]> {
  const groups = new Map<string | null, string[]>();
  for (const { id, viewId } of frames) groups.set(viewId, [...(groups.get(viewId) ?? []), id]);
  return groups;
}

const PROOF = { one: 'proof', many: 'proofs' };

async function putAll(commissionId: string, ids: readonly string[], sheet: SheetSummary | null): Promise<StudioSheet | SheetSummary> {
  let target: StudioSheet | SheetSummary | null = sheet;
  await inPortions(ids, async (frameIds) => {
    target = target
      ? await api.post<StudioSheet>(`/api/sheets/${target.id}/proofs`, { frameIds })
      : await api.post<StudioSheet>(`/api/commissions/${commissionId}/sheets`, { frameIds });
  });
  if (!target) throw new ApiProblem(422, 'Choose a frame first.');
  return target;
}

async function inPortions<T>(ids: readonly string[], send: (ids: string[]) => Promise<T>): Promise<T[]> {
  const answers: T[] = [];
  for (let at = 0; at < ids.length; at += AT_ONCE) answers.push(await send(ids.slice(at, at + AT_ONCE)));
  return answers;
}

function tellRefused(answers: readonly FramesChangedExcept[], what: string): void {
  const refused = answers.flatMap((answer) => answer.refused);
  const [first] = refused;
  if (!first) return;
  const others = refused.length > 1 ? ` The same goes for ${refused.length - 1} more.` : '';
  showNotice(`${first.name} ${what}: ${first.why}${others}`, { tone: 'problem' });
}
