import { Button } from '../../ui/button.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';

/** A commission without frames: what comes here, and how. */
export function NoFrames({ uploading }: { uploading: boolean }) {
  if (uploading) {
    return <EmptyState title="The first frames are on their way">Each appears here as soon as it has been checked.</EmptyState>;
  }
  return (
    <EmptyState title="No frames yet">
      Drop the finished set anywhere on this page: single files or whole folders, thousands at once. Nothing is changed in your files, and
      an upload that breaks goes on where it stopped.
    </EmptyState>
  );
}

/** There are frames, but none like this. */
export function NoneFound({ onAll }: { onAll: () => void }) {
  return (
    <EmptyState title="No frame is like this" action={<Button onClick={onAll}>Show all frames</Button>}>
      Nothing matches the view, the words and the kind of frame chosen above.
    </EmptyState>
  );
}
