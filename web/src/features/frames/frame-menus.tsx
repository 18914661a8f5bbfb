import { useQuery } from '@tanstack/react-query';
import type { SheetSummary } from '../../../../api/contract/sheets.ts';
import { sheetsQuery } from '../sheets/queries.ts';
import { Menu } from '../../ui/menu.tsx';
import type { FrameActions } from './actions.ts';

interface Props {
  ids: readonly string[];
  actions: FrameActions;
}

interface HangProps extends Props {
  views: ReadonlyMap<string, { title: string; number: number }>;
  label?: string;
}

/** Hangs frames under a view of the brief, or takes them down. */
export function HangMenu({ ids, actions, views, label = 'Hang under' }: HangProps) {
  const entries = [...views].map(([id, { title, number }]) => ({
    words: `View ${number} · ${title}`,
    onChoose: () => void actions.hang(ids, { id, title }),
  }));
  return <Menu label={label} entries={[...entries, { words: 'Under no view', onChoose: () => void actions.hang(ids, null) }]} />;
}

/** Puts frames on a sheet that is still being made or open, or on a new one. */
export function SheetMenu({ ids, actions, commissionId }: Props & { commissionId: string }) {
  const sheets = useQuery(sheetsQuery(commissionId)).data?.items ?? [];
  const entries = sheets.filter(takesProofs).map((sheet) => ({
    words: `Sheet ${sheet.number} · ${sheet.state.toLowerCase()} · ${sheet.proofCount} ${sheet.proofCount === 1 ? 'proof' : 'proofs'}`,
    onChoose: () => void actions.putOnSheet(ids, sheet),
  }));
  return (
    <Menu
      label="Put on proof sheet"
      entries={[...entries, { words: 'A new proof sheet', onChoose: () => void actions.putOnSheet(ids, null) }]}
    />
  );
}

function takesProofs(sheet: SheetSummary): boolean {
  return (sheet.state === 'Draft' || sheet.state === 'Open') && sheet.withdrawnAt === null;
}
