import { Dialog } from '../../ui/dialog.tsx';

const KEYS: [string, string][] = [
  ['Arrows', 'Move from frame to frame'],
  ['Shift with arrows', 'Choose everything you pass'],
  ['Space', 'Choose the frame, or leave it out again'],
  ['Enter', 'Open the frame'],
  ['Ctrl or ⌘ with A', 'Choose all'],
  ['Escape', 'Choose none'],
  ['Delete', 'Delete what is chosen, after asking'],
  ['?', 'This list'],
];

/** What the keyboard does in the grid. */
export function KeysDialog({ open, onClose }: { open: boolean; onClose: () => void }) {
  return (
    <Dialog open={open} onClose={onClose} title="Keys on this page">
      <dl className="grid grid-cols-[auto_1fr] gap-x-6 gap-y-1.5">
        {KEYS.map(([key, words]) => (
          <div key={key} className="contents">
            <dt className="font-bold">{key}</dt>
            <dd>{words}</dd>
          </div>
        ))}
      </dl>
    </Dialog>
  );
}
