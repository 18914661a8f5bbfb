import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { ClientDetail } from '../../../../api/contract/clients.ts';
import type { InviteGuest, StudioSheet } from '../../../../api/contract/sheets.ts';
import { api, ApiProblem } from '../../lib/api.ts';
import { formatDay } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { TextArea } from '../../ui/text-input.tsx';
import { PeopleFields, type Person } from './people-fields.tsx';
import { counted } from './sheet-words.ts';
import { useSheetDeed } from './mutations.ts';

interface Props {
  sheet: StudioSheet;
  clientId: string;
  onClose: () => void;
}

const empty = (role: Person['role']): Person => ({ key: crypto.randomUUID(), name: '', email: '', role });

function complete(people: Person[]): InviteGuest[] {
  return people.filter((person) => person.name.trim() || person.email.trim()).map(({ name, email, role }) => ({ name, email, role }));
}

/** Opens a draft to its first guests, or invites further people to an open sheet. */
export function InviteDialog({ sheet, clientId, onClose }: Props) {
  const first = !sheet.issuedAt;
  const client = useQuery({
    queryKey: ['clients', clientId],
    queryFn: ({ signal }) => api.get<ClientDetail>(`/api/clients/${clientId}`, { signal }),
  });
  const [people, setPeople] = useState<Person[]>([empty(first ? 'lead' : 'reviewer')]);
  const [words, setWords] = useState('');
  const deed = useSheetDeed(sheet);
  const invited = complete(people);
  const there = new Set(sheet.guests.map((guest) => guest.email));
  const known = (client.data?.contacts ?? []).filter(
    (contact) => !there.has(contact.email) && !people.some((person) => person.email === contact.email),
  );
  const problem = deed.error instanceof ApiProblem ? deed.error : null;

  const send = () => deed.mutate({ what: first ? 'issue' : 'guests', input: { guests: invited, words } }, { onSuccess: onClose });
  const add = (person: Person) => setPeople((before) => [...before.filter((each) => each.name || each.email), person]);

  return (
    <Dialog
      open
      wide
      title={first ? `Send proof sheet ${sheet.number}` : `Invite people to proof sheet ${sheet.number}`}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button tone="first" busy={deed.isPending} disabled={invited.length === 0} onClick={send}>
            {first ? `Send to ${counted(invited.length, 'person', 'people')}` : `Invite ${counted(invited.length, 'person', 'people')}`}
          </Button>
        </>
      }
    >
      <div className="grid gap-5">
        <p className="text-mute">
          {counted(sheet.proofCount, 'proof')}, {sheet.allowance} included
          {sheet.chooseBy ? `, to choose by ${formatDay(sheet.chooseBy)}` : ''}. Each person gets a link of their own by e-mail. A lead
          sends the picks; reviewers mark.
        </p>
        <PeopleFields people={people} errors={problem?.errors ?? []} onChange={setPeople} />
        <div className="flex flex-wrap gap-2">
          {known.map((contact) => (
            <Button
              key={contact.id}
              size="small"
              onClick={() =>
                add({
                  ...empty(people.some((person) => person.role === 'lead' && person.email) ? 'reviewer' : first ? 'lead' : 'reviewer'),
                  name: contact.name,
                  email: contact.email,
                })
              }
            >
              + {contact.name}
            </Button>
          ))}
          <Button size="small" onClick={() => setPeople((before) => [...before, empty('reviewer')])}>
            + Another person
          </Button>
        </div>
        <Field label="Your words" optional="may stay empty" hint="They stand in the e-mail, above the link.">
          {(control) => (
            <TextArea {...control} rows={4} maxLength={4000} value={words} onChange={(event) => setWords(event.target.value)} />
          )}
        </Field>
        {problem ? (
          <p role="alert" className="font-bold text-copper">
            {problem.detail}
          </p>
        ) : null}
      </div>
    </Dialog>
  );
}
