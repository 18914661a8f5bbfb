import { Button } from './button.tsx';

export interface Difference {
  label: string;
  /** What somebody else made of it meanwhile. */
  now: string;
  /** What was typed here. */
  typed: string;
}

interface Props {
  differences: Difference[];
  /** Gives up what was typed here. */
  onTakeNewer: () => void;
}

/** Somebody else saved first: what is there now beside what was typed here, and both ways out. Nothing is lost on the way. */
export function ChangedMeanwhile({ differences, onTakeNewer }: Props) {
  return (
    <div role="alert" className="border border-copper bg-copper-soft px-4 py-3">
      <p className="font-bold">Changed meanwhile</p>
      <p>
        Somebody else saved a newer version. What you typed is still here: save again to keep yours, or{' '}
        {differences.length > 0 ? 'compare first.' : 'go on, it says the same as yours.'}
      </p>
      {differences.length > 0 ? (
        <dl className="mt-2 grid gap-2">
          {differences.map(({ label, now, typed }) => (
            <div key={label} className="grid gap-x-4 border-t border-line pt-2 sm:grid-cols-[120px_1fr_1fr]">
              <dt className="font-bold">{label}</dt>
              <dd className="wrap-break-word whitespace-pre-wrap">
                <span className="lettering block">there now</span>
                {now || '–'}
              </dd>
              <dd className="wrap-break-word whitespace-pre-wrap">
                <span className="lettering block">typed here</span>
                {typed || '–'}
              </dd>
            </div>
          ))}
        </dl>
      ) : null}
      <Button size="small" className="mt-3" onClick={onTakeNewer}>
        Take the newer version
      </Button>
    </div>
  );
}
