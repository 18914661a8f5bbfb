import { useState } from 'react';
import { Button } from '../../ui/button.tsx';
import { Checkbox } from '../../ui/checkbox.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { DataTable, type Sorting } from '../../ui/data-table.tsx';
import { DimensionLine } from '../../ui/dimension-line.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { Field } from '../../ui/field.tsx';
import { Keystone } from '../../ui/keystone.tsx';
import { Menu } from '../../ui/menu.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { ProgressBar } from '../../ui/progress-bar.tsx';
import { Failure } from '../../ui/query-view.tsx';
import { Select } from '../../ui/select.tsx';
import { StepBar } from '../../ui/step-bar.tsx';
import { Storey } from '../../ui/storey.tsx';
import { StudioShell } from '../../ui/studio-shell.tsx';
import { TextArea, TextInput } from '../../ui/text-input.tsx';
import { TitleBlock } from '../../ui/title-block.tsx';

const CELLS = [
  { label: 'Commission', value: 'Ropewalk Library, first light to last', share: 2.2 },
  { label: 'Client', value: 'Tarn Brandreth Architects', share: 1.6 },
  { label: 'Shot', value: '28 Oct 2026' },
  { label: 'Due', value: '24 Nov 2026' },
  { label: 'Now', value: 'Preparing' },
];

const STEPS = [
  ['gallery', 'Brief', '6 views'],
  ['frames', 'Frames', '184'],
  ['proofs', 'Proofs', '42 chosen'],
  ['picks', 'Picks', '–'],
  ['finals', 'Finals', '–'],
  ['delivery', 'Delivery', '–'],
  ['record', 'Record', '31'],
].map(([to = '', words = '', figure = '']) => ({ to: `/${to}`, words, figure }));

/** Every part at once, to look at while building; only in development. */
export function Component() {
  const [asking, setAsking] = useState(false);
  const [sorting, setSorting] = useState<Sorting>({ key: 'name', down: false });
  return (
    <StudioShell account={<>Signed in as Oskar Lind</>}>
      <div className="mb-4 flex items-center justify-between">
        <PageTitle title="Parts" />
        <Button>New commission</Button>
      </div>
      <TitleBlock cells={CELLS}>
        <StepBar steps={STEPS} />
      </TitleBlock>
      <div className="mt-4 border border-dashed border-ink bg-sheet p-4">
        <ProgressBar
          label="Uploading 184 frames"
          part={0.62}
          counts="114 done · 3 waiting to retry"
          bytes={{ done: 5_100_000_000, total: 8_200_000_000 }}
          secondsLeft={355}
          actions={<Button size="small">Pause</Button>}
        />
      </div>
      {[0, 9, 12, 15, 40].map((picked) => (
        <DimensionLine key={picked} className="mt-4" picked={picked} included={12} price="£85" />
      ))}
      <DimensionLine className="mt-4" picked={3} included={0} price="£85" />
      <div className="my-6 flex flex-wrap gap-3">
        <Button tone="first" onClick={() => showNotice('12 frames hidden.', { undo: () => showNotice('Shown again.') })}>
          Hide 12
        </Button>
        <Button onClick={() => showNotice('Proof 7 could not be saved. Please try again.', { tone: 'problem' })}>Fail</Button>
        <Button tone="picked">Picked</Button>
        <Button tone="danger" onClick={() => setAsking(true)}>
          Delete
        </Button>
        <Button tone="quiet">Quiet</Button>
        <Button disabled>Disabled</Button>
        <Button busy>Busy</Button>
        <Menu
          label="Surround: paper"
          size="normal"
          align="left"
          entries={[
            { words: 'Paper', chosen: true, onChoose: () => undefined },
            { words: 'Mid grey', chosen: false, onChoose: () => undefined },
            { words: 'Black', chosen: false, onChoose: () => undefined },
          ]}
        />
        <Keystone number={1} size="small" />
        <Keystone number={7} />
        <Keystone number={13} extra />
        <Keystone number={128} extra size="large" />
      </div>
      <div className="grid gap-5 md:grid-cols-2">
        <Field label="Name" hint="As it stands on the invoice.">
          {(control) => <TextInput {...control} defaultValue="Ropewalk Library" />}
        </Field>
        <Field label="E-mail" error="This is no e-mail address.">
          {(control) => <TextInput {...control} type="email" defaultValue="ines" />}
        </Field>
        <Field label="Message" optional="optional">
          {(control) => <TextArea {...control} />}
        </Field>
        <Field label="Currency">{(control) => <Select {...control} choices={[{ value: 'GBP', words: 'GBP, pounds' }]} />}</Field>
        <Checkbox label="Tiled" hint="The words repeat over the whole picture." />
      </div>
      <Storey className="mt-6" gutter="narrow" lettering="Yours" title="To do next">
        <DataTable
          caption="Commissions"
          rowKey={(row) => row.name}
          sorting={sorting}
          onSort={setSorting}
          columns={[
            { key: 'name', words: 'Commission', cell: (row) => <b>{row.name}</b>, sortable: true },
            { key: 'client', words: 'Client', cell: (row) => row.client, sortable: true },
            { key: 'picks', words: 'Picks', cell: (row) => row.picks, align: 'right' },
          ]}
          rows={[
            { name: 'Ropewalk Library', client: 'Tarn Brandreth Architects', picks: 14 },
            { name: 'Basin bridges', client: 'Harbour Trust', picks: 6 },
          ]}
        />
      </Storey>
      <div className="mt-6 grid gap-5 md:grid-cols-2">
        <EmptyState title="No frames yet" action={<Button tone="first">Add frames</Button>}>
          Drop files or a whole folder here.
        </EmptyState>
        <Failure error={new Error('x')} onRetry={() => undefined} />
      </div>
      <ConfirmDialog
        open={asking}
        title="Delete 12 frames?"
        confirm="Delete 12 frames"
        onClose={() => setAsking(false)}
        onConfirm={() => setAsking(false)}
      >
        Their originals go from the store after 30 days. Until then they can be taken back.
      </ConfirmDialog>
    </StudioShell>
  );
}
