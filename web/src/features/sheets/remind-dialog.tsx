import { useState } from 'react';
import type { StudioSheet } from '../../../../api/contract/sheets.ts';
import { formatDay } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { TextArea } from '../../ui/text-input.tsx';
import { useSheetDeed } from './mutations.ts';
import { counted } from './sheet-words.ts';

/** Reminds everybody on an open sheet of its last date. */
export function RemindDialog({ sheet, onClose }: { sheet: StudioSheet; onClose: () => void }) {
  const [words, setWords] = useState('');
  const deed = useSheetDeed(sheet);
  const people = sheet.guests.filter((guest) => !guest.withdrawnAt).length;
  const remind = () =>
    deed.mutate(
      { what: 'remind', words },
      {
        onSuccess: () => {
          showNotice(`A reminder is on its way to ${counted(people, 'person', 'people')}.`);
          onClose();
        },
      },
    );
  return (
    <Dialog
      open
      title={`Remind of proof sheet ${sheet.number}`}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button tone="first" busy={deed.isPending} onClick={remind}>
            Remind {counted(people, 'person', 'people')}
          </Button>
        </>
      }
    >
      <div className="grid gap-4">
        <p>
          Each gets an e-mail that names the last date{sheet.chooseBy ? `, ${formatDay(sheet.chooseBy)},` : ''} and carries a new link;
          older links stop working.
        </p>
        <Field label="Your words" optional="may stay empty">
          {(control) => (
            <TextArea {...control} rows={3} maxLength={4000} value={words} onChange={(event) => setWords(event.target.value)} />
          )}
        </Field>
        {deed.error ? (
          <p role="alert" className="font-bold text-copper">
            {deed.error.message}
          </p>
        ) : null}
      </div>
    </Dialog>
  );
}
