import { useState } from 'react';
import type { StudioSheet } from '../../../../api/contract/sheets.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { WatermarkFields } from '../watermark/watermark-fields.tsx';
import { WatermarkPreview } from '../watermark/watermark-preview.tsx';
import { useSheetDeed } from './mutations.ts';

/** The watermark of one sheet, with a look at it on the sheet's first proof. */
export function WatermarkDialog({ sheet, onClose }: { sheet: StudioSheet; onClose: () => void }) {
  const [watermark, setWatermark] = useState(sheet.watermark);
  const deed = useSheetDeed(sheet);
  const save = () => deed.mutate({ what: 'change', version: sheet.version, input: { watermark } }, { onSuccess: onClose });
  return (
    <Dialog
      open
      wide
      title={`Watermark of proof sheet ${sheet.number}`}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button tone="first" busy={deed.isPending} onClick={save}>
            Use this watermark
          </Button>
        </>
      }
    >
      <div className="grid gap-5 md:grid-cols-[1fr_1.2fr]">
        <WatermarkFields value={watermark} onChange={setWatermark} />
        <WatermarkPreview watermark={watermark} frameId={sheet.proofs[0]?.frameId} />
      </div>
      {deed.error ? (
        <p role="alert" className="mt-3 font-bold text-copper">
          {deed.error.message}
        </p>
      ) : null}
    </Dialog>
  );
}
