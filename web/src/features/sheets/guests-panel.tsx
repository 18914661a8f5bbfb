import { useState } from 'react';
import type { SheetGuestRow, StudioSheet } from '../../../../api/contract/sheets.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { useSheetDeed } from './mutations.ts';
import { counted, guestState } from './sheet-words.ts';

const TONES = { plain: 'text-mute', attention: 'font-bold text-copper', settled: 'text-verdigris' };

/** The people invited to a sheet: whether they came, what they marked, and what can be done about their link. */
export function GuestsPanel({ sheet, onInvite }: { sheet: StudioSheet; onInvite: () => void }) {
  const [taking, setTaking] = useState<SheetGuestRow | null>(null);
  const deed = useSheetDeed(sheet);
  const takeBack = (guest: SheetGuestRow) =>
    deed.mutate(
      { what: 'withdraw-guest', guestId: guest.id },
      {
        onSuccess: () => {
          setTaking(null);
          showNotice(`The link of ${guest.name} no longer works.`, {
            undo: () => deed.mutate({ what: 'restore-guest', guestId: guest.id }),
          });
        },
      },
    );
  return (
    <section aria-labelledby="guests-of-sheet" className="border border-ink bg-sheet px-4.5 py-4">
      <div className="flex flex-wrap items-center justify-between gap-2">
        <h2 id="guests-of-sheet" className="text-17">
          People
        </h2>
        {sheet.can.invite ? (
          <Button size="small" onClick={onInvite}>
            Invite
          </Button>
        ) : null}
      </div>
      {sheet.guests.length === 0 ? <p className="mt-1 text-mute">Nobody is invited yet.</p> : null}
      <ul className="mt-1">
        {sheet.guests.map((guest) => (
          <GuestLine key={guest.id} guest={guest} sheet={sheet} deed={deed} onTakeBack={() => setTaking(guest)} />
        ))}
      </ul>
      {deed.error && !taking ? (
        <p role="alert" className="mt-2 font-bold text-copper">
          {deed.error.message}
        </p>
      ) : null}
      <ConfirmDialog
        open={taking !== null}
        title="Take the link back"
        confirm="Take it back"
        busy={deed.isPending}
        error={deed.error?.message}
        onClose={() => setTaking(null)}
        onConfirm={() => taking && takeBack(taking)}
      >
        {taking?.name} can no longer open this sheet, at once and on every device.{' '}
        {taking?.marks
          ? `Their ${counted(taking.marks, 'mark')} no longer ${taking.marks === 1 ? 'counts' : 'count'}, and come back if you let them in again.`
          : ''}
      </ConfirmDialog>
    </section>
  );
}

interface LineProps {
  guest: SheetGuestRow;
  sheet: StudioSheet;
  deed: ReturnType<typeof useSheetDeed>;
  onTakeBack: () => void;
}

function GuestLine({ guest, sheet, deed, onTakeBack }: LineProps) {
  const state = guestState(guest);
  const again = () =>
    deed.mutate(
      { what: 'send-again', guestId: guest.id, words: '' },
      { onSuccess: () => showNotice(`A new link is on its way to ${guest.name}. The one before no longer works.`) },
    );
  return (
    <li className="list-none border-t border-hair py-2.5 first:border-0">
      <p className="flex justify-between gap-3">
        <b className="min-w-0 wrap-break-word">{guest.name}</b>
        <span className="lettering pt-1">{guest.role}</span>
      </p>
      <p className="text-13 wrap-anywhere text-mute">{guest.email}</p>
      <p className="text-13">
        <span className={TONES[state.tone]}>{state.words}</span>
        {guest.byOpenLink ? <span className="text-mute"> · by the open link</span> : null}
        {guest.marks > 0 ? <span className="text-mute"> · {counted(guest.marks, 'mark')}</span> : null}
      </p>
      {sheet.can.invite ? (
        <p className="mt-1 -ml-3 flex flex-wrap">
          {guest.withdrawnAt ? (
            <Button size="small" tone="quiet" onClick={() => deed.mutate({ what: 'restore-guest', guestId: guest.id })}>
              Let in again
            </Button>
          ) : (
            <>
              <Button size="small" tone="quiet" aria-label={`Send again: a new link to ${guest.name}`} onClick={again}>
                Send again
              </Button>
              <Button size="small" tone="quiet" aria-label={`Take back the link of ${guest.name}`} onClick={onTakeBack}>
                Take back
              </Button>
            </>
          )}
        </p>
      ) : null}
    </li>
  );
}
