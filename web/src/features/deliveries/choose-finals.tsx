import type { FinalItem, FinalVersionItem } from '../../../../api/contract/finals.ts';
import { formatBytes } from '../../lib/bytes.ts';
import { Button } from '../../ui/button.tsx';
import { sizeWords } from '../finals/final-words.ts';
import { Thumb } from '../finals/thumb.tsx';

/** A final that can go out, with the version that is chosen of it. */
export interface Deliverable {
  final: FinalItem;
  version: FinalVersionItem;
}

/** Newest versions of everything that is settled; what has to be asked first cannot go out. */
export function deliverables(finals: readonly FinalItem[]): Deliverable[] {
  return finals.flatMap((final) => {
    const [version] = final.versions;
    return final.match !== 'ask' && version ? [{ final, version }] : [];
  });
}

interface Props {
  all: readonly Deliverable[];
  chosen: ReadonlySet<string>;
  onChange: (chosen: ReadonlySet<string>) => void;
}

/** Which finals go out, as pictures to tick. */
export function ChooseFinals({ all, chosen, onChange }: Props) {
  const bytes = all.filter(({ version }) => chosen.has(version.id)).reduce((sum, { version }) => sum + version.size, 0);
  const toggle = (id: string) => {
    const next = new Set(chosen);
    if (!next.delete(id)) next.add(id);
    onChange(next);
  };
  return (
    <fieldset className="grid min-w-0 gap-3">
      <legend className="pb-2">
        <b>Which finals</b>{' '}
        <span className="text-mute" aria-live="polite">
          · {chosen.size} of {all.length} chosen, {formatBytes(bytes)}
        </span>
      </legend>
      <div className="flex gap-2">
        <Button size="small" onClick={() => onChange(new Set(all.map(({ version }) => version.id)))}>
          Choose all
        </Button>
        <Button size="small" onClick={() => onChange(new Set())}>
          Choose none
        </Button>
      </div>
      <ul className="grid max-h-[60vh] gap-3 overflow-y-auto p-1.5 md:grid-cols-2 xl:grid-cols-3">
        {all.map(({ final, version }) => (
          <li key={version.id} className="list-none">
            <label className="target flex items-center gap-3 border border-line bg-sheet p-2 has-checked:border-ink">
              <input
                type="checkbox"
                className="size-[18px] shrink-0"
                checked={chosen.has(version.id)}
                onChange={() => toggle(version.id)}
              />
              <Thumb {...version} picture={version.pictures?.['480']} box={{ width: 96, height: 64 }} />
              <span className="min-w-0 text-13">
                <b className="block break-words">{final.title}</b>
                <span className="block text-mute">{sizeWords(version)}</span>
                {version.deliveries.length > 0 ? (
                  <span className="block text-verdigris">in delivery {version.deliveries.join(', ')}</span>
                ) : version.number > 1 ? (
                  <span className="block text-mute">version {version.number}</span>
                ) : null}
              </span>
            </label>
          </li>
        ))}
      </ul>
    </fieldset>
  );
}
