import { addClient } from '../../api/features/clients/add-client.ts';
import { addCommission } from '../../api/features/commissions/add-commission.ts';
import { hangFrames } from '../../api/features/frames/change-frames.ts';
import { View } from '../../api/models/View.ts';
import type { DrawnFrame } from '../scenes/draw.ts';
import type { Assignment } from '../scenes/takes.ts';
import { framesByName } from './bring-files.ts';
import type { Person } from './people.ts';
import { dayFromNow, type Stage } from './stage.ts';

interface Firm {
  name: string;
  remarks: string;
  people: Record<string, Person>;
}

/** Adds a client with everybody known there. Returns its id. */
export async function addFirm({ ctx, owner }: Stage, { name, remarks, people }: Firm): Promise<string> {
  const contacts = Object.values(people).map((person) => ({ ...person, telephone: '' }));
  return (await addClient(ctx, owner, { name, remarks, contacts })).id;
}

export interface Brief {
  clientId: string;
  title: string;
  brief: string;
  allowance: number;
  /** Price of a picture beyond the allowance, in pence. */
  extraPrice: number;
  shotDaysAgo: number | null;
  dueInDays: number | null;
  /** What each view shows, and what was asked for. */
  views: readonly (readonly [string, string])[];
}

/** Begins a commission with its views. Returns its id. */
export async function begin({ ctx, owner }: Stage, brief: Brief): Promise<string> {
  const { clientId, title, allowance, extraPrice, shotDaysAgo, dueInDays } = brief;
  const commission = await addCommission(ctx, owner, {
    clientId,
    title,
    brief: brief.brief,
    allowance,
    extraPrice,
    currency: 'GBP',
    shotOn: shotDaysAgo === null ? null : dayFromNow(-shotDaysAgo),
    dueOn: dueInDays === null ? null : dayFromNow(dueInDays),
    views: brief.views.map(([view, askedFor]) => ({ title: view, askedFor })),
  });
  return commission.id;
}

/** Hangs frames under views: for each view, in order, the names of its frames. */
export async function hang({ owner }: Stage, commissionId: string, byView: readonly (readonly string[])[]): Promise<void> {
  const views = await View.query().where({ commissionId }).orderBy('position');
  const frame = await framesByName(commissionId);
  for (const [at, stems] of byView.entries()) {
    const view = views[at];
    if (view && stems.length > 0) await hangFrames(owner, commissionId, stems.map((stem) => frame(stem).id), view.id); // prettier-ignore
  }
}

/** The frames of an assignment, or its finished files. */
export function filesOf({ frames }: Stage, assignment: Assignment, final: boolean): DrawnFrame[] {
  return frames.filter((frame) => frame.assignment === assignment && frame.final === final);
}

/** A run of frame numbers as names: `stems(412, 416)` is HL_0412 to HL_0416. */
export function stems(from: number, to: number = from): string[] {
  return Array.from({ length: to - from + 1 }, (_, i) => `HL_${String(from + i).padStart(4, '0')}`);
}
