import { zodResolver } from '@hookform/resolvers/zod';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm, type UseFormReturn } from 'react-hook-form';
import type { CommissionDetail } from '../../../../api/contract/commissions.ts';
import { api, ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { ChangedMeanwhile } from '../../ui/changed-meanwhile.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { FormError, FormField } from '../sign-in/form-field.tsx';
import { landErrors } from '../sign-in/land-errors.ts';
import { CommissionFields, type CommissionValues, differencesOf, fieldsOf, type TypedFields } from './commission-fields.ts';
import { CommissionInputs } from './commission-inputs.tsx';
import { useCommissionChanges } from './live.ts';
import { commissionKeys, commissionQuery } from './queries.ts';

/** The words and terms of a commission. What is being typed is never replaced by what others save meanwhile. */
export function BriefForm({ commission }: { commission: CommissionDetail }) {
  const queries = useQueryClient();
  const [version, setVersion] = useState(commission.version);
  const [newer, setNewer] = useState<CommissionDetail | null>(null);
  const form = useForm<TypedFields, unknown, CommissionValues>({
    resolver: zodResolver(CommissionFields),
    defaultValues: fieldsOf(commission),
  });
  const { isDirty, isSubmitting } = form.formState;
  // What the fields hold is text; what a submit gives is checked and read.
  const typed = form as unknown as UseFormReturn<TypedFields>;
  const settle = (now: CommissionDetail) => {
    form.reset(fieldsOf(now));
    setVersion(now.version);
    setNewer(null);
  };
  // Saved by somebody else while nothing is typed here: show theirs. With something typed, the save will tell.
  useCommissionChanges(commission.id, (change) => {
    if (!('what' in change) || change.what !== 'commission-changed' || form.formState.isDirty) return;
    const look = api.get<CommissionDetail>(`/api/commissions/${commission.id}`).then((now) => {
      if (!form.formState.isDirty) settle(now);
    });
    // Gone or out of reach: whoever saves hears of it then.
    look.catch(() => undefined);
  });
  const submit = form.handleSubmit(async (values) => {
    try {
      const saved = await api.patch<CommissionDetail>(`/api/commissions/${commission.id}`, values, { version });
      settle(saved);
      queries.setQueryData(commissionQuery(commission.id).queryKey, saved);
      void queries.invalidateQueries({ queryKey: commissionKeys.lists });
      showNotice('Saved.');
    } catch (error) {
      if (!(error instanceof ApiProblem) || error.status !== 412) return landErrors(form, error);
      const now = await api.get<CommissionDetail>(`/api/commissions/${commission.id}`);
      setVersion(now.version);
      setNewer(now);
    }
  });
  return (
    <form noValidate className="border border-ink bg-sheet p-5" onSubmit={(event) => void submit(event)}>
      <fieldset disabled={!commission.can.edit} className="grid gap-4">
        <FormError>{form.formState.errors.root?.message}</FormError>
        {newer ? <ChangedMeanwhile differences={differencesOf(newer, form.getValues())} onTakeNewer={() => settle(newer)} /> : null}
        <FormField form={typed} name="title" label="Title" autoComplete="off" />
        <CommissionInputs form={typed} mayPrice={commission.can.price} />
        {commission.can.edit ? (
          <div>
            <Button type="submit" tone="first" busy={isSubmitting} disabled={!isDirty && !newer}>
              Save
            </Button>
          </div>
        ) : null}
      </fieldset>
    </form>
  );
}
