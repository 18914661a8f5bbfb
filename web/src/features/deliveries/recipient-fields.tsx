import type { KnownPerson } from '../../../../api/contract/deliveries.ts';
import type { FieldError } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Field } from '../../ui/field.tsx';
import { TextInput } from '../../ui/text-input.tsx';

/** A row of the form; the key is its own, as rows come and go. */
export interface RecipientRow {
  key: string;
  name: string;
  email: string;
}

/** A new row, empty or of somebody known. */
export function recipientRow(person: { name: string; email: string } = { name: '', email: '' }): RecipientRow {
  return { key: crypto.randomUUID(), name: person.name, email: person.email };
}

/** The rows that were filled in, as the server takes them. */
export function namedRecipients(rows: readonly RecipientRow[]): { name: string; email: string }[] {
  return rows.filter((row) => row.name.trim() || row.email.trim()).map(({ name, email }) => ({ name: name.trim(), email: email.trim() }));
}

interface Props {
  rows: RecipientRow[];
  people: readonly KnownPerson[];
  errors: readonly FieldError[];
  onChange: (rows: RecipientRow[]) => void;
}

/** Who gets the files: a row a person, and those who are known as buttons. */
export function RecipientFields({ rows, people, errors, onChange }: Props) {
  const filled = rows.filter((row) => row.name || row.email);
  const set = (key: string, part: Partial<RecipientRow>) => onChange(rows.map((row) => (row.key === key ? { ...row, ...part } : row)));
  // The server counts the rows it was sent: those that are filled in.
  const errorOf = (row: RecipientRow, field: string) =>
    errors.find((error) => error.path === `recipients.${filled.indexOf(row)}.${field}`)?.message;
  const offered = people.filter((person) => !rows.some((row) => row.email.trim().toLowerCase() === person.email));
  return (
    <fieldset className="grid min-w-0 gap-3">
      <legend className="pb-2 font-bold">Who gets the files</legend>
      {rows.map((row, at) => (
        <div key={row.key} className="grid items-start gap-3 sm:grid-cols-[1fr_1.3fr_auto]">
          <Field label="Name" error={errorOf(row, 'name')}>
            {(control) => (
              <TextInput
                {...control}
                autoComplete="off"
                value={row.name}
                onChange={(event) => set(row.key, { name: event.target.value })}
              />
            )}
          </Field>
          <Field label="E-mail" error={errorOf(row, 'email')}>
            {(control) => (
              <TextInput
                {...control}
                type="email"
                autoComplete="off"
                value={row.email}
                onChange={(event) => set(row.key, { email: event.target.value })}
              />
            )}
          </Field>
          <Button
            tone="quiet"
            size="small"
            className="sm:mt-7"
            disabled={rows.length === 1}
            aria-label={`Leave out ${row.name || `person ${at + 1}`}`}
            onClick={() => onChange(rows.filter((other) => other.key !== row.key))}
          >
            Leave out
          </Button>
        </div>
      ))}
      <div className="flex flex-wrap gap-2">
        {offered.map((person) => (
          <Button key={person.email} size="small" title={person.email} onClick={() => onChange([...filled, recipientRow(person)])}>
            + {person.name}
          </Button>
        ))}
        <Button size="small" onClick={() => onChange([...rows, recipientRow()])}>
          + Another person
        </Button>
      </div>
    </fieldset>
  );
}
