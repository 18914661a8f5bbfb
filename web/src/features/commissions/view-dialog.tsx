import { zodResolver } from '@hookform/resolvers/zod';
import { useId, useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { AddView, type View, type Views } from '../../../../api/contract/commissions.ts';
import { api, ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { ChangedMeanwhile } from '../../ui/changed-meanwhile.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { TextArea } from '../../ui/text-input.tsx';
import { FormError, FormField } from '../sign-in/form-field.tsx';
import { landErrors } from '../sign-in/land-errors.ts';

interface Props {
  commissionId: string;
  /** The view to change; none adds one. */
  view: View | null;
  onClose: () => void;
  onSaved: () => void;
}

/** Adds or changes a view. Mounted anew for each one. */
export function ViewDialog({ commissionId, view, onClose, onSaved }: Props) {
  const id = useId();
  const path = `/api/commissions/${commissionId}/views`;
  const [base, setBase] = useState(view);
  const [newer, setNewer] = useState<View | null>(null);
  const form = useForm<z.input<typeof AddView>, unknown, AddView>({
    resolver: zodResolver(AddView),
    defaultValues: { title: view?.title ?? '', askedFor: view?.askedFor ?? '' },
  });
  const submit = form.handleSubmit(async (values) => {
    try {
      await (base ? api.patch(`${path}/${base.id}`, values, { version: base.version }) : api.post(path, values));
      onSaved();
      onClose();
    } catch (error) {
      if (!base || !(error instanceof ApiProblem) || error.status !== 412) return landErrors(form, error);
      const { items } = await api.get<Views>(path);
      const now = items.find((each) => each.id === base.id) ?? null;
      setBase(now);
      setNewer(now);
    }
  });
  const typed = form.getValues();
  return (
    <Dialog
      open
      title={view ? 'Change the view' : 'Add a view'}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" form={id} tone="first" busy={form.formState.isSubmitting}>
            {view ? 'Save' : 'Add view'}
          </Button>
        </>
      }
    >
      <form id={id} noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
        <FormError>{form.formState.errors.root?.message}</FormError>
        {newer ? (
          <ChangedMeanwhile
            differences={[
              { label: 'View', now: newer.title, typed: typed.title },
              { label: 'Asked for', now: newer.askedFor, typed: typed.askedFor ?? '' },
            ].filter((each) => each.now !== each.typed)}
            onTakeNewer={() => {
              form.reset({ title: newer.title, askedFor: newer.askedFor });
              setNewer(null);
            }}
          />
        ) : null}
        <FormField
          form={form}
          name="title"
          label="What it shows"
          hint="For instance: east front across the basin, dusk"
          autoComplete="off"
        />
        <Field label="Asked for" optional="how many, for what, in which format" error={form.formState.errors.askedFor?.message}>
          {(control) => <TextArea rows={3} {...control} {...form.register('askedFor')} />}
        </Field>
      </form>
    </Dialog>
  );
}
