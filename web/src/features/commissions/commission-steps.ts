import type { StepFigures } from '../../../../api/contract/commissions.ts';
import type { Step } from '../../ui/step-bar.tsx';

const NONE = '–';

function counted(count: number, one: string, many = `${one}s`): string {
  return count === 0 ? NONE : `${count} ${count === 1 ? one : many}`;
}

function proofs({ proofs: all, proofsOut }: StepFigures): string {
  if (proofsOut > 0) return `${proofsOut} out`;
  return all > 0 ? `${all} chosen` : NONE;
}

function picks({ picks: count, extras }: StepFigures): string {
  if (count === 0) return NONE;
  return extras > 0 ? `${count}, ${extras} extra` : String(count);
}

function finals({ picks: wanted, ofPicks, finals: all }: StepFigures): string {
  return wanted > 0 ? `${ofPicks} of ${wanted}` : counted(all, 'file');
}

/** The steps of a commission, left to right, each with its one figure. */
export function commissionSteps(id: string, figures: StepFigures): Step[] {
  const to = (step: string) => `/commissions/${id}/${step}`;
  return [
    { to: to('brief'), words: 'Brief', figure: counted(figures.views, 'view') },
    { to: to('frames'), words: 'Frames', figure: figures.frames === 0 ? NONE : String(figures.frames) },
    { to: to('proofs'), words: 'Proofs', figure: proofs(figures) },
    { to: to('picks'), words: 'Picks', figure: picks(figures) },
    { to: to('finals'), words: 'Finals', figure: finals(figures) },
    { to: to('delivery'), words: 'Delivery', figure: figures.deliveries === 0 ? NONE : `${figures.deliveries} sent` },
    { to: to('record'), words: 'Record', figure: figures.record === 0 ? NONE : String(figures.record) },
  ];
}
