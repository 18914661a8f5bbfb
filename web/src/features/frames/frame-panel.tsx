import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { FrameCheck, FrameItem } from '../../../../api/contract/frames.ts';
import { QueryView } from '../../ui/query-view.tsx';
import { FitList } from '../uses/fit-list.tsx';
import { AsShot } from './as-shot.tsx';
import type { BracketSet } from './bracket-places.ts';
import { alignedWords, leftOutWords } from './bracket-words.ts';
import { Histogram } from './histogram.tsx';
import { frameQuery } from './queries.ts';

interface Props {
  frame: FrameItem;
  set: BracketSet | null;
  merged: boolean;
}

/** Beside the picture: what to look at, what it is good for, how bright it is, how it was taken. */
export function FramePanel({ frame, set, merged }: Props) {
  const details = useQuery(frameQuery(frame.id));
  return (
    <aside
      tabIndex={0}
      aria-label="Settings and file"
      className="overflow-y-auto border-t border-ink bg-paper p-5 text-ink lg:border-t-0 lg:border-l"
    >
      {set ? <BracketFacts set={set} /> : null}
      {!merged && frame.checks.length > 0 ? <Checks checks={frame.checks} /> : null}
      {frame.width > 0 ? (
        <PanelPart title="Fit for use">
          <FitList picture={frame} />
        </PanelPart>
      ) : null}
      <QueryView query={details}>
        {(full) => (
          <>
            {!merged && full.measures ? (
              <PanelPart title="Brightness">
                <Histogram measures={full.measures} />
              </PanelPart>
            ) : null}
            <AsShot frame={full} />
          </>
        )}
      </QueryView>
    </aside>
  );
}

export function PanelPart({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="mb-6 border-t border-ink pt-2">
      <h2 className="lettering">{title}</h2>
      {children}
    </section>
  );
}

function BracketFacts({ set: { bracket, frames } }: { set: BracketSet }) {
  const { merged, shows, says } = bracket;
  return (
    <PanelPart title="Bracket">
      <p className="py-1.5">{says}</p>
      <p className="text-13 text-mute">
        {merged.state === 'ready' ? `${alignedWords(bracket)}. ` : ''}
        {merged.state === 'waiting' ? 'The merged picture is being made. ' : ''}
        {merged.problem ? `${merged.problem} ` : ''}
        {shows === 'merged' && merged.state !== 'failed' ? 'The merged picture is its proof.' : 'The lead frame is its proof.'}
      </p>
      {leftOutWords(bracket, frames).map((words) => (
        <p key={words} className="text-13 text-copper">
          {words}
        </p>
      ))}
    </PanelPart>
  );
}

/** What needs a look stands out; the rest is information. */
function Checks({ checks }: { checks: readonly FrameCheck[] }) {
  return (
    <PanelPart title="Checks">
      <ul>
        {checks.map((check) => (
          <li key={check.check} className={`list-none border-b border-hair py-1.5 ${check.toCheck ? '' : 'text-mute'}`}>
            {check.toCheck ? <b className="text-copper">To check: </b> : null}
            {check.says}
          </li>
        ))}
      </ul>
    </PanelPart>
  );
}
