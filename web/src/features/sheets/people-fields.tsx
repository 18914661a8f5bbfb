import type { FieldError } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Field } from '../../ui/field.tsx';
import { Select } from '../../ui/select.tsx';
import { TextInput } from '../../ui/text-input.tsx';

export interface Person {
  key: string;
  name: string;
  email: string;
  role: 'lead' | 'reviewer';
}

const ROLES = [
  { value: 'lead', words: 'Lead' },
  { value: 'reviewer', words: 'Reviewer' },
];

interface Props {
  people: Person[];
  errors: FieldError[];
  onChange: (people: Person[]) => void;
}

/** A row a person: name, address, role. */
export function PeopleFields({ people, errors, onChange }: Props) {
  const set = (key: string, part: Partial<Person>) =>
    onChange(people.map((person) => (person.key === key ? { ...person, ...part } : person)));
  const errorOf = (at: number, field: string) => errors.find((error) => error.path === `guests.${at}.${field}`)?.message;
  return (
    <ul className="grid gap-3">
      {people.map((person, at) => (
        <li key={person.key} className="grid list-none items-start gap-3 sm:grid-cols-[1fr_1.2fr_auto_auto]">
          <Field label="Name" error={errorOf(at, 'name')}>
            {(control) => (
              <TextInput
                {...control}
                autoComplete="off"
                value={person.name}
                onChange={(event) => set(person.key, { name: event.target.value })}
              />
            )}
          </Field>
          <Field label="E-mail" error={errorOf(at, 'email')}>
            {(control) => (
              <TextInput
                {...control}
                type="email"
                autoComplete="off"
                value={person.email}
                onChange={(event) => set(person.key, { email: event.target.value })}
              />
            )}
          </Field>
          <Field label="Role">
            {(control) => (
              <Select
                {...control}
                choices={ROLES}
                value={person.role}
                onChange={(event) => set(person.key, { role: event.target.value as Person['role'] })}
              />
            )}
          </Field>
          <Button
            tone="quiet"
            size="small"
            className="sm:mt-7"
            aria-label={`Leave out ${person.name || `person ${at + 1}`}`}
            disabled={people.length === 1}
            onClick={() => onChange(people.filter((each) => each.key !== person.key))}
          >
            Leave out
          </Button>
        </li>
      ))}
    </ul>
  );
}
