import { useState } from 'react';
import { ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { TextArea, TextInput } from '../../ui/text-input.tsx';
import { useSheetDeed } from './mutations.ts';

interface Props {
  sheet: { id: string; commissionId: string; number: number; chooseBy: string | null; endsAt: string | null };
  onClose: () => void;
}

/** Opens a sheet again: with a reason, and a new last date where the old one has passed. */
export function ReopenDialog({ sheet, onClose }: Props) {
  const [reason, setReason] = useState('');
  const [chooseBy, setChooseBy] = useState(sheet.chooseBy ?? '');
  const deed = useSheetDeed(sheet);
  const problem = deed.error instanceof ApiProblem ? deed.error : null;
  const errorOf = (path: string) => problem?.errors.find((error) => error.path === path)?.message;
  const reopen = () =>
    deed.mutate(
      { what: 'reopen', input: { reason, ...(chooseBy && chooseBy !== sheet.chooseBy ? { chooseBy } : {}) } },
      { onSuccess: onClose },
    );
  return (
    <Dialog
      open
      title={`Reopen proof sheet ${sheet.number}`}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button tone="first" busy={deed.isPending} onClick={reopen}>
            Reopen and tell the leads
          </Button>
        </>
      }
    >
      <div className="grid gap-4">
        <p>The client can mark again. The pick list that was sent stays on record, and the next one shows what changed.</p>
        <Field label="Why" hint="The leads read this in their e-mail and on the sheet." error={errorOf('reason')}>
          {(control) => (
            <TextArea {...control} rows={3} maxLength={2000} value={reason} onChange={(event) => setReason(event.target.value)} />
          )}
        </Field>
        <Field label="Choose by" error={errorOf('chooseBy')}>
          {(control) => <TextInput {...control} type="date" value={chooseBy} onChange={(event) => setChooseBy(event.target.value)} />}
        </Field>
        {problem && problem.errors.length === 0 ? (
          <p role="alert" className="font-bold text-copper">
            {problem.detail}
          </p>
        ) : null}
      </div>
    </Dialog>
  );
}
