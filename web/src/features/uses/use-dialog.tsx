import { useForm, useWatch } from 'react-hook-form';
import type { Use } from '../../../../api/domain/fit-for-use.ts';
import { Button } from '../../ui/button.tsx';
import { Checkbox } from '../../ui/checkbox.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { FormError, FormField } from '../sign-in/form-field.tsx';
import { landErrors } from '../sign-in/land-errors.ts';
import { fieldsOf, NEW_USE, readUse, resolveUse, type UseFields } from './use-fields.ts';
import { idFor, KINDS } from './use-words.ts';

interface Props {
  /** The use that is changed; null for a new one. */
  use: Use | null;
  taken: readonly string[];
  /** Rejects with what the server said. */
  onSave: (use: Use) => Promise<unknown>;
  onClose: () => void;
}

/** Asks for one use: what it is called, how large it is, and what is needed there. */
export function UseDialog({ use, taken, onSave, onClose }: Props) {
  const form = useForm<UseFields>({ resolver: resolveUse, defaultValues: use ? fieldsOf(use) : NEW_USE });
  const kind = useWatch({ control: form.control, name: 'kind' });
  const unit = kind === 'screen' ? 'pixels' : 'cm';
  const submit = form.handleSubmit(async (fields) => {
    const read = readUse(fields, use?.id ?? idFor(fields.title, taken));
    if (!('use' in read)) return;
    await onSave(read.use).then(onClose, (error: unknown) => landErrors(form, error));
  });
  return (
    <Dialog open title={use ? `Change ${use.title}` : 'A new use'} onClose={onClose}>
      <form noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
        <FormError>{form.formState.errors.root?.message}</FormError>
        <fieldset>
          <legend className="font-bold">Kind</legend>
          {Object.entries(KINDS).map(([value, { words, hint }]) => (
            <Checkbox key={value} kind="radio" value={value} label={words} hint={hint} {...form.register('kind')} />
          ))}
        </fieldset>
        <FormField form={form} name="title" label="Name" hint="As your clients call it: “A3 spread”." maxLength={60} />
        <div className="grid grid-cols-2 gap-4">
          <FormField form={form} name="width" label={`Width, ${unit}`} inputMode="decimal" />
          <FormField
            form={form}
            name="height"
            label={`Height, ${unit}`}
            inputMode="decimal"
            {...(kind === 'seen-from' ? { hint: 'Empty: as the picture has it.' } : {})}
          />
        </div>
        {kind === 'page' ? (
          <FormField form={form} name="ppi" label="Pixels per inch" hint="300 in the hand is common practice." inputMode="decimal" />
        ) : null}
        {kind === 'seen-from' ? <FormField form={form} name="distance" label="Distance, metres" inputMode="decimal" /> : null}
        <div className="flex justify-end gap-2">
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" tone="first" busy={form.formState.isSubmitting}>
            {use ? 'Save' : 'Add'}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
