import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { useParams } from 'react-router-dom';
import { previewQuery } from '../../features/sheets/queries.ts';
import { SheetBody } from '../../features/sheets-guest/sheet-body.tsx';
import { SheetHead } from '../../features/sheets-guest/sheet-head.tsx';
import { readStoreys } from '../../features/sheets-guest/sheet-rows.ts';
import { SurroundMenu } from '../../features/sheets-guest/surround-menu.tsx';
import { useSurround } from '../../features/sheets-guest/surround.ts';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { QueryView } from '../../ui/query-view.tsx';
import type { SheetPreview } from '../../../../api/contract/guest-sheets.ts';

const NO_MARKS = new Map<string, never>();

/** /commissions/:commissionId/proofs/:sheetId/preview: the sheet with the guests' own parts, without anything to press. */
export function Component() {
  const { sheetId = '', commissionId = '' } = useParams();
  return (
    <QueryView query={useQuery(previewQuery(sheetId))}>
      {(preview) => <Preview preview={preview} back={`/commissions/${commissionId}/proofs/${sheetId}`} />}
    </QueryView>
  );
}

function Preview({ preview: { sheet, proofs }, back }: { preview: SheetPreview; back: string }) {
  const [surround, setSurround] = useSurround('sheet');
  const storeys = useMemo(() => readStoreys(proofs), [proofs]);
  return (
    <GuestShell
      studio={sheet.studio.name}
      aside={
        <>
          <span className="text-mute">As your client sees it</span>
          <SurroundMenu surround={surround} onChoose={setSurround} />
          <LinkButton size="small" to={back}>
            Back to the sheet
          </LinkButton>
        </>
      }
    >
      <SheetHead sheet={sheet} picked={0} takesFocus />
      <div data-surround={surround} className="-mx-4 mt-4 flex-1 bg-paper px-4 pb-6 text-ink md:-mx-10 md:px-10">
        <SheetBody storeys={storeys} marks={NO_MARKS} places={NO_MARKS} role="reviewer" />
      </div>
    </GuestShell>
  );
}
