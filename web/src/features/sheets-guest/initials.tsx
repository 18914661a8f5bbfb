import { useTranslation } from 'react-i18next';
import type { Person } from '../marks/read-marks.ts';

interface Props {
  people: Person[];
  /** How many fit; the rest is counted. */
  most: number;
}

/** Who else marked a proof: their initials, with their names for those who cannot see or do not know them. */
export function Initials({ people, most }: Props) {
  const { t } = useTranslation();
  if (people.length === 0) return null;
  const shown = people.slice(0, people.length > most ? Math.max(most - 1, 0) : most);
  const rest = people.length - shown.length;
  const names = people.map((person) => person.name).join(', ');
  return (
    <span className="flex gap-1" title={t('marks.by', { names })}>
      <span className="sr-only">{t('marks.by', { names })}</span>
      {shown.map((person) => (
        <span key={person.accountId} aria-hidden="true" className={CHIP}>
          {person.initials}
        </span>
      ))}
      {rest > 0 ? (
        <span aria-hidden="true" className={CHIP}>
          {shown.length > 0 ? `+${rest}` : rest}
        </span>
      ) : null}
    </span>
  );
}

const CHIP = 'grid h-6 min-w-6 place-items-center border border-grey bg-sheet px-0.5 text-13 text-ink';
