import { lazy, Suspense, useEffect, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Link, useParams } from 'react-router-dom';
import { forgetLookedAt, lookedAt } from '../../features/sheets-guest/looked-at.ts';
import { SheetBody } from '../../features/sheets-guest/sheet-body.tsx';
import { SheetDoor, type SheetData } from '../../features/sheets-guest/sheet-door.tsx';
import { SheetFoot } from '../../features/sheets-guest/sheet-foot.tsx';
import { SheetHead } from '../../features/sheets-guest/sheet-head.tsx';
import { SheetStateWords } from '../../features/sheets-guest/sheet-state-words.tsx';
import { SurroundMenu } from '../../features/sheets-guest/surround-menu.tsx';
import { useSurround } from '../../features/sheets-guest/surround.ts';
import { EmptyState } from '../../ui/empty-state.tsx';
import { GuestShell } from '../../ui/guest-shell.tsx';

const LookingLine = lazy(() => import('../../features/open-links/looking-line.tsx'));

/** The guest's sheet: every proof of a commission in storeys, to be marked. */
export function Component() {
  const { sheetId = '' } = useParams();
  return (
    <SheetDoor key={sheetId} sheetId={sheetId}>
      {(data) => <SheetView data={data} />}
    </SheetDoor>
  );
}

function SheetView({ data }: { data: SheetData }) {
  const { t } = useTranslation();
  const { sheet, storeys, marks, places, mark, ask, renewPictures } = data;
  const looks = sheet.me.role === 'looker';
  const [surround, setSurround] = useSurround('sheet');
  const [comingFrom] = useState(() => lookedAt(sheet.id));
  useEffect(() => forgetLookedAt(sheet.id), [sheet.id]);
  const mine = [...marks.values()].filter((one) => one.mine).length;
  return (
    <GuestShell
      studio={sheet.studio.name}
      aside={
        <>
          {looks ? null : (
            <Link to="/mine" className="target flex min-w-0 items-center underline-offset-4 hover:underline">
              <span className="truncate">
                <span className="max-sm:sr-only">{t('sheet.signedInAs')} </span>
                {sheet.me.name}
              </span>
            </Link>
          )}
          <SurroundMenu surround={surround} onChoose={setSurround} />
        </>
      }
      foot={<SheetFoot sheet={sheet} picked={places.size} mine={mine} />}
    >
      <SheetHead sheet={sheet} picked={places.size} takesFocus={comingFrom === undefined} />
      {looks ? (
        <Suspense>
          <LookingLine sheet={sheet} onAsk={ask} />
        </Suspense>
      ) : null}
      <SheetStateWords sheet={sheet} />
      <div data-surround={surround} className="-mx-4 mt-4 flex-1 bg-paper px-4 pb-6 text-ink md:-mx-10 md:px-10">
        {storeys.length === 0 ? (
          <EmptyState title={t('sheet.emptyTitle')}>{t('sheet.empty', { studio: sheet.studio.name })}</EmptyState>
        ) : (
          <SheetBody
            storeys={storeys}
            marks={marks}
            places={places}
            role={sheet.me.role}
            onMark={mark}
            addressOf={(proof) => `/sheets/${sheet.id}/proofs/${proof.number}`}
            comingFrom={comingFrom}
            onPictureFailed={renewPictures}
          />
        )}
      </div>
    </GuestShell>
  );
}
