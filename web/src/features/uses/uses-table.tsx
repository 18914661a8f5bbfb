import { useState, type ReactNode } from 'react';
import type { StudioUses } from '../../../../api/contract/studios.ts';
import type { Use } from '../../../../api/domain/fit-for-use.ts';
import { Button } from '../../ui/button.tsx';
import { type Column, DataTable } from '../../ui/data-table.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { UseDialog } from './use-dialog.tsx';
import { KINDS, moved, neededOf, sizeOf } from './use-words.ts';

interface Props {
  list: StudioUses;
  busy: boolean;
  /** Puts another list in place and says what was done; rejects with what the server said. */
  onChange: (uses: Use[], says: string) => Promise<unknown>;
}

/** What the studio's pictures are wanted for, in its order: added, changed, put elsewhere, removed. */
export function UsesTable({ list: { uses, defaults, can }, busy, onChange }: Props) {
  const [asking, setAsking] = useState<Use | 'new' | null>(null);
  const put = (next: Use[], says: string) => void onChange(next, says).catch(() => undefined);
  const save = (use: Use) =>
    asking === 'new'
      ? onChange([...uses, use], `${use.title} is added.`)
      : onChange(
          uses.map((one) => (one.id === use.id ? use : one)),
          `${use.title} is changed.`,
        );
  const columns: Column<Use>[] = [
    { key: 'title', words: 'Use', cell: (use) => <TwoLines first={<b>{use.title}</b>} second={KINDS[use.kind].words} /> },
    { key: 'size', words: 'Size, and needed to be sharp', cell: (use) => <TwoLines first={sizeOf(use)} second={neededOf(use)} /> },
  ];
  const change: Column<Use> = {
    key: 'change',
    words: 'Change',
    align: 'right',
    width: '270px',
    cell: (use) => {
      const at = uses.indexOf(use);
      const rest = uses.filter((one) => one !== use);
      return (
        <span className="flex justify-end gap-1.5">
          <Mover sign="↑" words={`Move ${use.title} up`} disabled={busy || at === 0} onMove={() => put(moved(uses, at, -1), '')} />
          <Mover
            sign="↓"
            words={`Move ${use.title} down`}
            disabled={busy || at === uses.length - 1}
            onMove={() => put(moved(uses, at, 1), '')}
          />
          <Button size="small" aria-label={`Change ${use.title}`} onClick={() => setAsking(use)}>
            Change
          </Button>
          <Button size="small" aria-label={`Remove ${use.title}`} disabled={busy} onClick={() => put(rest, `${use.title} is removed.`)}>
            Remove
          </Button>
        </span>
      );
    },
  };
  return (
    <>
      {uses.length > 0 ? (
        <DataTable
          className="max-w-4xl"
          caption="Uses"
          columns={can.change ? [...columns, change] : columns}
          rows={uses}
          rowKey={(use) => use.id}
        />
      ) : (
        <EmptyState title="No uses">Nothing is said about what a picture is good for.</EmptyState>
      )}
      {can.change ? (
        <div className="mt-4 flex flex-wrap gap-2">
          <Button tone="first" onClick={() => setAsking('new')}>
            Add a use
          </Button>
          <Button busy={busy} onClick={() => put(defaults, 'The list is the default one again.')}>
            Take the defaults
          </Button>
        </div>
      ) : (
        <p className="mt-4 text-mute">Only the owner of the studio changes these.</p>
      )}
      {asking ? (
        <UseDialog use={asking === 'new' ? null : asking} taken={uses.map(({ id }) => id)} onSave={save} onClose={() => setAsking(null)} />
      ) : null}
    </>
  );
}

function TwoLines({ first, second }: { first: ReactNode; second: string }) {
  return (
    <>
      {first}
      <span className="block text-13 text-mute">{second}</span>
    </>
  );
}

function Mover({ sign, words, disabled, onMove }: { sign: string; words: string; disabled: boolean; onMove: () => void }) {
  return (
    <Button size="small" className="px-2" aria-label={words} disabled={disabled} onClick={onMove}>
      <span aria-hidden="true">{sign}</span>
    </Button>
  );
}
