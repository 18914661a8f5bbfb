import { Dialog } from '../../ui/dialog.tsx';

/** A key, and what it does. */
export type KeyWords = readonly [key: string, words: string];

/** What the keyboard does in the grid. */
export const GRID_KEYS: readonly KeyWords[] = [
  ['Arrows', 'Move from frame to frame'],
  ['Shift with arrows', 'Choose everything you pass'],
  ['Space', 'Choose the frame, or leave it out again'],
  ['Enter', 'Open the frame'],
  ['Ctrl or ⌘ with A', 'Choose all'],
  ['Escape', 'Choose none'],
  ['Delete', 'Delete what is chosen, after asking'],
  ['?', 'This list'],
];

/** What the keyboard does in a photographer's viewer. */
export const VIEWER_KEYS: readonly KeyWords[] = [
  ['Left and right', 'The frame before, the frame after'],
  ['Up and down', 'Through the merged picture and the frames of a bracket, in place'],
  ['B', 'While held: the merged picture against the lead frame'],
  ['Z', 'Between the whole picture and 100%'],
  ['Shift with arrows', 'Move about at 100%'],
  ['H', 'Show what is clipped'],
  ['G', 'The next guides over the picture'],
  ['S', 'Change the surround'],
  ['Escape', 'Back to all frames'],
  ['?', 'This list'],
];

interface Props {
  title: string;
  keys: readonly KeyWords[];
  open: boolean;
  onClose: () => void;
}

/** What the keyboard does here. */
export function KeysDialog({ title, keys, open, onClose }: Props) {
  return (
    <Dialog open={open} onClose={onClose} title={title}>
      <dl className="grid grid-cols-[auto_1fr] gap-x-6 gap-y-1.5">
        {keys.map(([key, words]) => (
          <div key={key} className="contents">
            <dt className="font-bold">{key}</dt>
            <dd>{words}</dd>
          </div>
        ))}
      </dl>
    </Dialog>
  );
}
