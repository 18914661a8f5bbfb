import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useOutletContext, useParams } from 'react-router-dom';
import { DeleteDialog } from '../../../features/frames/delete-dialog.tsx';
import { HangMenu, SheetMenu } from '../../../features/frames/frame-menus.tsx';
import { FrameViewer } from '../../../features/frames/frame-viewer.tsx';
import { frameQuery } from '../../../features/frames/queries.ts';
import { Button } from '../../../ui/button.tsx';
import { Dialog } from '../../../ui/dialog.tsx';
import { QueryView } from '../../../ui/query-view.tsx';
import type { FramesOutlet } from './frames-page.tsx';

/** /commissions/:commissionId/frames/:frameId, above the page of all frames. */
export function Component() {
  const { commissionId = '', frameId = '' } = useParams();
  const { all, shown, views, actions, go, close } = useOutletContext<FramesOutlet>();
  const [asking, setAsking] = useState(false);
  const list = shown.some((one) => one.id === frameId) ? shown : all;
  const at = list.findIndex((one) => one.id === frameId);
  const frame = list[at];
  if (!frame) return <NotLoaded frameId={frameId} onClose={() => close(frameId)} />;
  const [before, after] = [list[at - 1], list[at + 1]];

  const remove = async () => {
    await actions.remove([frame.id]);
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
      onGo={go}
      onClose={() => close(frame.id)}
    >
      {frame.state === 'ready' ? <SheetMenu ids={[frame.id]} actions={actions} commissionId={commissionId} /> : null}
      <HangMenu ids={[frame.id]} actions={actions} views={views} />
      <Button size="small" onClick={() => void actions.hide([frame.id], !frame.hidden)}>
        {frame.hidden ? 'Show again' : 'Hide'}
      </Button>
      <Button size="small" tone="danger" onClick={() => setAsking(true)}>
        Delete
      </Button>
      <DeleteDialog open={asking} frames={[frame]} onDelete={remove} onClose={() => setAsking(false)} />
    </FrameViewer>
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
