import { useId, useState, type FormEvent } from 'react';
import type { OpenLinkTerms } from '../../../../api/contract/open-links.ts';
import type { StudioSheet } from '../../../../api/contract/sheets.ts';
import { formatDay } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { Checkbox } from '../../ui/checkbox.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import { formProblem } from '../guests/form-problem.ts';
import { useSheetDeed } from './mutations.ts';

/** What the link asks for and its last day: when it is switched on, and to change it later. */
export function OpenLinkDialog({ sheet, onClose }: { sheet: StudioSheet; onClose: () => void }) {
  const link = sheet.openLink;
  const form = useId();
  const deed = useSheetDeed(sheet);
  const [passphrase, setPassphrase] = useState('');
  const [clears, setClears] = useState(false);
  const [endsOn, setEndsOn] = useState(link?.endsOn ?? '');
  const { at, general } = formProblem(deed.error);

  const save = (event: FormEvent) => {
    event.preventDefault();
    if (deed.isPending) return;
    const input: OpenLinkTerms = {
      ...(clears ? { passphrase: null } : passphrase ? { passphrase } : {}),
      ...(endsOn === (link?.endsOn ?? '') ? {} : { endsOn: endsOn || null }),
    };
    const done = () => {
      showNotice(link ? 'The open link is changed.' : 'The open link is on. Copy its address and hand it on.');
      onClose();
    };
    deed.mutate({ what: link ? 'change-open-link' : 'switch-open-link-on', input }, { onSuccess: done });
  };

  return (
    <Dialog
      open
      title={link ? 'Change the open link' : `Switch the open link of proof sheet ${sheet.number} on`}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button tone="first" type="submit" form={form} busy={deed.isPending}>
            {link ? 'Save' : 'Switch on'}
          </Button>
        </>
      }
    >
      <form id={form} noValidate onSubmit={save} className="grid gap-5">
        <div className="grid gap-2">
          <Field
            label={link?.hasPassphrase ? 'A new passphrase' : 'Passphrase'}
            optional="may stay empty"
            hint={
              link?.hasPassphrase
                ? 'Empty: it stays as it is. A new one has at least 8 characters, and whoever looks by the present one has to give it.'
                : 'At least 8 characters. Tell it by another way than the link: on the telephone, say.'
            }
            error={at('passphrase')}
          >
            {(control) => (
              <TextInput
                {...control}
                autoComplete="off"
                autoCapitalize="none"
                spellCheck={false}
                maxLength={200}
                disabled={clears}
                value={passphrase}
                onChange={(event) => setPassphrase(event.target.value)}
              />
            )}
          </Field>
          {link?.hasPassphrase ? (
            <Checkbox label="Ask for no passphrase any more" checked={clears} onChange={(event) => setClears(event.target.checked)} />
          ) : null}
        </div>
        <Field
          label="Last day"
          optional="may stay empty"
          hint={`Else it ends with the sheet${sheet.chooseBy ? `, on ${formatDay(sheet.chooseBy)}` : ''}.`}
          error={at('endsOn')}
        >
          {(control) => (
            <TextInput
              {...control}
              type="date"
              max={sheet.chooseBy ?? undefined}
              value={endsOn}
              onChange={(event) => setEndsOn(event.target.value)}
            />
          )}
        </Field>
        {general ? (
          <p role="alert" className="font-bold text-copper">
            {general}
          </p>
        ) : null}
      </form>
    </Dialog>
  );
}
