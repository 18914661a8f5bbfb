import { useState } from 'react';
import type { Bracket } from '../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { Button } from '../../ui/button.tsx';
import { Menu } from '../../ui/menu.tsx';
import type { FrameActions } from './actions.ts';
import type { BracketActions } from './bracket-actions.ts';
import { BracketDialog } from './bracket-dialog.tsx';
import { HangMenu } from './frame-menus.tsx';
import { stem } from './frame-words.ts';
import { allBut, type Section } from './sections.ts';

interface Props {
  section: Section;
  views: ReadonlyMap<string, { title: string; number: number }>;
  actions: FrameActions;
  bracketActions: BracketActions;
}

/** The buttons in a section's heading. */
export function SectionTools({ section, ...rest }: Props) {
  if (section.kind === 'bracket') return <BracketTools bracket={section.bracket} frames={section.frames} {...rest} />;
  if (section.kind === 'alike' && section.sharpest) {
    return <KeepSharpest frames={section.frames} sharpest={section.sharpest} actions={rest.actions} />;
  }
  return null;
}

function KeepSharpest({ frames, sharpest, actions }: { frames: FrameItem[]; sharpest: FrameItem; actions: FrameActions }) {
  const others = allBut(frames, sharpest).map((frame) => frame.id);
  return (
    <Button size="small" onClick={() => void actions.hide(others, true)}>
      Keep {stem(sharpest.name)}, hide the {others.length === 1 ? 'other' : `other ${others.length}`}
    </Button>
  );
}

interface BracketToolsProps extends Omit<Props, 'section'> {
  bracket: Bracket;
  frames: FrameItem[];
}

function BracketTools({ bracket, frames, views, actions, bracketActions }: BracketToolsProps) {
  const [asking, setAsking] = useState(false);
  const view = bracket.viewId === null ? undefined : views.get(bracket.viewId);
  const entries = [
    { words: 'Its frames …', onChoose: () => setAsking(true) },
    ...(['merged', 'lead'] as const).map((shows) => ({
      words: shows === 'merged' ? 'Show the merged picture' : 'Show the lead frame',
      chosen: bracket.shows === shows,
      disabled: !bracket.can.change,
      onChoose: () => void bracketActions.change(bracket, { shows }),
    })),
  ];
  return (
    <>
      {bracket.can.regroup ? (
        <Button size="small" onClick={() => void bracketActions.split(bracket)}>
          Split
        </Button>
      ) : null}
      <HangMenu ids={bracket.frameIds} actions={actions} views={views} label={view ? `View ${view.number}` : 'View'} />
      <Menu label="More" entries={entries} />
      {asking ? <BracketDialog bracket={bracket} frames={frames} actions={bracketActions} onClose={() => setAsking(false)} /> : null}
    </>
  );
}
