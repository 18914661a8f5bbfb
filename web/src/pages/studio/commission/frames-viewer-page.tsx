import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useLocation, useOutletContext, useParams } from 'react-router-dom';
import type { FrameItem } from '../../../../../api/contract/frames.ts';
import { bracketSetOf } from '../../../features/frames/bracket-places.ts';
import { DeleteDialog } from '../../../features/frames/delete-dialog.tsx';
import { HangMenu, SheetMenu } from '../../../features/frames/frame-menus.tsx';
import { FrameViewer } from '../../../features/frames/frame-viewer.tsx';
import { frameQuery } from '../../../features/frames/queries.ts';
import { MERGED } from '../../../features/frames/use-frame-ways.ts';
import { Button } from '../../../ui/button.tsx';
import { Dialog } from '../../../ui/dialog.tsx';
import { QueryView } from '../../../ui/query-view.tsx';
import type { FramesOutlet } from './frames-page.tsx';

/** /commissions/:commissionId/frames/:frameId, above the page of all frames. */
export function Component() {
  const { frameId = '' } = useParams();
  const { hash } = useLocation();
  const { all, shown, brackets, can, go, close } = useOutletContext<FramesOutlet>();
  const list = shown.some((one) => one.id === frameId) ? shown : all;
  const at = list.findIndex((one) => one.id === frameId);
  const frame = list[at];
  if (!frame) return <NotLoaded frameId={frameId} onClose={() => close(frameId)} />;
  const set = bracketSetOf(frame, all, brackets);
  const [before, after] = [list[at - 1], list[at + 1]];
  const leave = () => {
    const next = after ?? before;
    if (next) go(next.id);
    else close(frame.id);
  };
  return (
    <FrameViewer
      frame={frame}
      place={{ at: at + 1, of: list.length }}
      before={before}
      after={after}
      set={set}
      merged={hash === MERGED && set?.bracket.merged.state === 'ready'}
      onGo={go}
      onClose={() => close(frame.id)}
    >
      {can ? <FrameTools frame={frame} onGone={leave} /> : null}
    </FrameViewer>
  );
}

/** What can be done with the frame that is looked at; `onGone` is called when it has left the frames shown. */
function FrameTools({ frame, onGone }: { frame: FrameItem; onGone: () => void }) {
  const { commissionId = '' } = useParams();
  const { views, actions, deleted } = useOutletContext<FramesOutlet>();
  const [asking, setAsking] = useState(false);
  const leaveIf = (gone: boolean) => {
    if (gone) onGone();
  };
  if (deleted) {
    return (
      <Button size="small" onClick={() => void actions.restore([frame]).then(leaveIf)}>
        Bring back
      </Button>
    );
  }
  return (
    <>
      {frame.state === 'ready' ? <SheetMenu ids={[frame.id]} actions={actions} commissionId={commissionId} /> : null}
      <HangMenu ids={[frame.id]} actions={actions} views={views} />
      <Button size="small" onClick={() => void actions.hide([frame.id], !frame.hidden)}>
        {frame.hidden ? 'Show again' : 'Hide'}
      </Button>
      <Button size="small" tone="danger" onClick={() => setAsking(true)}>
        Delete
      </Button>
      <DeleteDialog
        open={asking}
        frames={[frame]}
        onDelete={() => actions.remove([frame.id]).then(leaveIf)}
        onClose={() => setAsking(false)}
      />
    </>
  );
}

/** The frame is not among those loaded: they are still coming, or it was deleted. */
function NotLoaded({ frameId, onClose }: { frameId: string; onClose: () => void }) {
  const query = useQuery(frameQuery(frameId));
  return (
    <Dialog open title="Frame" onClose={onClose} actions={<Button onClick={onClose}>All frames</Button>}>
      <QueryView query={query}>
        {(frame) => (
          <p>
            {frame.deletedAt === null ? `${frame.name} is being loaded.` : `${frame.name} was deleted. It can be brought back for 30 days.`}
          </p>
        )}
      </QueryView>
    </Dialog>
  );
}
