import { useQueryClient, type QueryClient } from '@tanstack/react-query';
import { useEffect, useMemo } from 'react';
import type { Frame, FrameList } from '../../../../api/contract/frames.ts';
import { api, ApiProblem } from '../../lib/api.ts';
import { useCommissionChanges } from '../commissions/live.ts';
import { removeFrames, writeFrames } from './frame-cache.ts';
import { frameKeys, frameSummaryQuery } from './queries.ts';

/** Changes of this long are fetched together. */
const GATHER_MS = 700;
/** More frames than this are fetched by a list, not one by one. */
const FEW = 4;
const NEWEST = 200;

/** Keeps the loaded frames as they are on the server: new ones come, pictures appear when they are made. */
export function useLiveFrames(commissionId: string): void {
  const queries = useQueryClient();
  const gatherer = useMemo(() => new Gatherer(queries, commissionId), [queries, commissionId]);
  useEffect(() => () => gatherer.stop(), [gatherer]);
  useCommissionChanges(commissionId, (change) => {
    if (change.type === 'lost') return gatherer.everything();
    if (!('what' in change)) return;
    if (typeof change.frameId === 'string' && /^frame-/.test(String(change.what))) gatherer.frame(change.frameId);
    else if (['frames-changed', 'brackets-changed', 'missed'].includes(String(change.what))) gatherer.everything();
  });
}

/** Gathers what changed and fetches it now and then: a set of a thousand frames is told in two thousand changes. */
class Gatherer {
  #frames = new Set<string>();
  #all = false;
  #timer: ReturnType<typeof setTimeout> | undefined;
  #fetching = false;

  constructor(
    private readonly queries: QueryClient,
    private readonly commissionId: string,
  ) {}

  frame(id: string): void {
    this.#frames.add(id);
    this.#soon();
  }

  everything(): void {
    this.#all = true;
    this.#soon();
  }

  stop(): void {
    clearTimeout(this.#timer);
    this.#timer = undefined;
  }

  #soon(): void {
    this.#timer ??= setTimeout(() => void this.#fetch(), GATHER_MS);
  }

  async #fetch(): Promise<void> {
    this.#timer = undefined;
    if (this.#fetching) return this.#soon();
    this.#fetching = true;
    try {
      await this.#take();
    } catch {
      // The line is down: when it is back the stream tells `lost`, and everything is read anew.
      this.#all = true;
    } finally {
      this.#fetching = false;
    }
  }

  async #take(): Promise<void> {
    const ids = [...this.#frames];
    const all = this.#all;
    this.#frames.clear();
    this.#all = false;
    void this.queries.invalidateQueries({ queryKey: frameSummaryQuery(this.commissionId).queryKey });
    if (all) {
      void this.queries.invalidateQueries({ queryKey: frameKeys.deleted(this.commissionId) });
      void this.queries.invalidateQueries({ queryKey: frameKeys.brackets(this.commissionId) });
      return this.queries.invalidateQueries({ queryKey: frameKeys.list(this.commissionId) });
    }
    const missing = ids.length > FEW ? await this.#newest(ids) : ids;
    for (const id of missing) await this.#one(id);
  }

  /** Reads the newest frames in one list; answers with the ids that are not among them. */
  async #newest(ids: string[]): Promise<string[]> {
    const path = `/api/commissions/${this.commissionId}/frames`;
    const { items } = await api.get<FrameList>(path, { query: { sort: 'added', order: 'desc', limit: NEWEST } });
    const wanted = new Set(ids);
    writeFrames(
      this.queries,
      this.commissionId,
      items.filter((item) => wanted.delete(item.id)),
    );
    return [...wanted];
  }

  async #one(id: string): Promise<void> {
    try {
      const frame = await api.get<Frame>(`/api/frames/${id}`);
      this.queries.setQueryData(frameKeys.one(id), frame);
      if (frame.deletedAt === null) writeFrames(this.queries, this.commissionId, [frame]);
      else removeFrames(this.queries, this.commissionId, [id]);
    } catch (error) {
      if (!(error instanceof ApiProblem) || error.status !== 404) throw error;
      removeFrames(this.queries, this.commissionId, [id]);
    }
  }
}
