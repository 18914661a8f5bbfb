import { useState } from 'react';
import type { DeliveryList } from '../../../../api/contract/deliveries.ts';
import type { FinalList } from '../../../../api/contract/finals.ts';
import { ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Field } from '../../ui/field.tsx';
import { TextArea, TextInput } from '../../ui/text-input.tsx';
import { ChooseFinals, deliverables } from './choose-finals.tsx';
import { useDeliveryDeed } from './mutations.ts';
import { namedRecipients, RecipientFields, recipientRow } from './recipient-fields.tsx';

interface Props {
  commissionId: string;
  finals: FinalList;
  list: DeliveryList;
  onDone: () => void;
}

const today = () => new Date().toISOString().slice(0, 10);

/** The form of a new delivery: which finals, to whom, until when, with what words. */
export function NewDelivery({ commissionId, finals, list, onDone }: Props) {
  const all = deliverables(finals.finals);
  const [chosen, setChosen] = useState<ReadonlySet<string>>(() => freshOnes(all));
  const [rows, setRows] = useState(() => [recipientRow(list.people[0])]);
  const [fetchBy, setFetchBy] = useState(list.proposedFetchBy);
  const [words, setWords] = useState('');
  // One key for one intention: a second press, or a lost answer, makes no second delivery.
  const [key] = useState(() => crypto.randomUUID());
  const deeds = useDeliveryDeed(commissionId);
  const problem = deeds.error instanceof ApiProblem ? deeds.error : null;
  const errorOf = (path: string) => problem?.errors.find((error) => error.path === path)?.message;
  const recipients = namedRecipients(rows);
  const ids = all.filter(({ version }) => chosen.has(version.id)).map(({ version }) => version.id);
  const send = () =>
    deeds.mutate({ what: 'make', input: { finalVersionIds: ids, recipients, fetchBy, words, key } }, { onSuccess: onDone });
  return (
    <section aria-labelledby="new-delivery" className="border border-ink bg-sheet">
      <h2 id="new-delivery" className="border-b border-line px-5 py-3 text-17">
        New delivery
      </h2>
      <form
        noValidate
        className="grid gap-6 px-5 py-4"
        onSubmit={(event) => {
          event.preventDefault();
          if (!deeds.isPending) send();
        }}
      >
        <ChooseFinals all={all} chosen={chosen} onChange={setChosen} />
        <RecipientFields rows={rows} people={list.people} errors={problem?.errors ?? []} onChange={setRows} />
        <div className="grid gap-6 md:grid-cols-[240px_1fr]">
          <Field label="Fetch by" hint="The last day, in your studio’s time zone." error={errorOf('fetchBy')}>
            {(control) => (
              <TextInput {...control} type="date" min={today()} value={fetchBy} onChange={(event) => setFetchBy(event.target.value)} />
            )}
          </Field>
          <Field
            label="Your words"
            optional="may stay empty"
            hint="They stand in the e-mail and above the pictures."
            error={errorOf('words')}
          >
            {(control) => (
              <TextArea {...control} rows={3} maxLength={4000} value={words} onChange={(event) => setWords(event.target.value)} />
            )}
          </Field>
        </div>
        {problem ? (
          <p role="alert" className="font-bold text-copper">
            {problem.detail}
          </p>
        ) : null}
        <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
          <Button type="submit" tone="first" busy={deeds.isPending} disabled={ids.length === 0 || recipients.length === 0}>
            {`Deliver ${ids.length === 1 ? 'one file' : `${ids.length} files`} to ${recipients.length === 1 ? 'one person' : `${recipients.length} people`}`}
          </Button>
          <Button onClick={onDone}>Cancel</Button>
          <p className="text-13 text-mute">The archives are built first; the e-mails go out when they are ready.</p>
        </div>
      </form>
    </section>
  );
}

/** What never went out is chosen to begin with; where everything did, all of it. */
function freshOnes(all: ReturnType<typeof deliverables>): ReadonlySet<string> {
  const fresh = all.filter(({ version }) => version.deliveries.length === 0);
  return new Set((fresh.length > 0 ? fresh : all).map(({ version }) => version.id));
}
