import { Button } from '../../ui/button.tsx';
import type { BracketPlace } from './bracket-places.ts';
import type { Blink } from './use-blink.ts';

interface Props {
  places: readonly BracketPlace[];
  frameId: string;
  merged: boolean;
  onGo: (id: string, merged: boolean) => void;
  /** Undefined where there is no merged picture. */
  blink: Blink | undefined;
}

/** Below a bracket's picture: the ways to its other pictures, each shown in the same place. */
export function BracketStrip({ places, frameId, merged, onGo, blink }: Props) {
  return (
    <div role="group" aria-label="Pictures of the bracket" className="flex flex-wrap justify-center gap-1.5">
      {places.map((place) => {
        const here = place.merged === merged && (merged || place.frameId === frameId);
        return (
          <Button
            key={`${place.frameId}${String(place.merged)}`}
            size="small"
            tone={here ? 'first' : 'plain'}
            aria-current={here || undefined}
            aria-label={place.merged ? 'Merged proof' : `${place.short}, ${place.name}`}
            onClick={() => onGo(place.frameId, place.merged)}
          >
            {place.short}
          </Button>
        );
      })}
      {blink ? (
        <Button size="small" className="ml-3" aria-pressed={blink.running || blink.other} onClick={blink.press}>
          {merged ? 'Blink against the lead' : 'Blink against merged'}
        </Button>
      ) : null}
    </div>
  );
}
