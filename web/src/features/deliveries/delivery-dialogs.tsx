import { useState } from 'react';
import type { KnownPerson, StudioDelivery } from '../../../../api/contract/deliveries.ts';
import { ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import { useDeliveryDeed } from './mutations.ts';
import { namedRecipients, RecipientFields, recipientRow } from './recipient-fields.tsx';

interface Props {
  commissionId: string;
  delivery: StudioDelivery;
  onClose: () => void;
}

/** Another last date; an ended delivery opens again by a later one. */
export function ExtendDialog({ commissionId, delivery, onClose }: Props) {
  const [fetchBy, setFetchBy] = useState(delivery.fetchBy);
  const deeds = useDeliveryDeed(commissionId);
  const error = deeds.error instanceof ApiProblem ? deeds.error.detail : undefined;
  const save = () => deeds.mutate({ what: 'extend', delivery, fetchBy }, { onSuccess: onClose });
  return (
    <Dialog
      open
      title={`Last date of delivery ${delivery.number}`}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button tone="first" busy={deeds.isPending} disabled={fetchBy === ''} onClick={save}>
            Save
          </Button>
        </>
      }
    >
      <Field label="Fetch by" hint="The last day, in your studio’s time zone. Links that were sent work until then." error={error}>
        {(control) => <TextInput {...control} type="date" value={fetchBy} onChange={(event) => setFetchBy(event.target.value)} />}
      </Field>
    </Dialog>
  );
}

/** Further people for a delivery that is made already. */
export function AddRecipientsDialog({ commissionId, delivery, people, onClose }: Props & { people: readonly KnownPerson[] }) {
  const [rows, setRows] = useState(() => [recipientRow()]);
  const deeds = useDeliveryDeed(commissionId);
  const problem = deeds.error instanceof ApiProblem ? deeds.error : null;
  const recipients = namedRecipients(rows);
  const there = new Set(delivery.recipients.filter((one) => !one.withdrawnAt).map((one) => one.email));
  const add = () => deeds.mutate({ what: 'add', delivery, recipients }, { onSuccess: onClose });
  return (
    <Dialog
      open
      wide
      title={`Add people to delivery ${delivery.number}`}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button tone="first" busy={deeds.isPending} disabled={recipients.length === 0} onClick={add}>
            {delivery.sentAt ? 'Add and send the link' : 'Add'}
          </Button>
        </>
      }
    >
      <RecipientFields
        rows={rows}
        people={people.filter((person) => !there.has(person.email))}
        errors={problem?.errors ?? []}
        onChange={setRows}
      />
      {problem ? (
        <p role="alert" className="mt-3 font-bold text-copper">
          {problem.detail}
        </p>
      ) : null}
    </Dialog>
  );
}
