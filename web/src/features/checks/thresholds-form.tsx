import { zodResolver } from '@hookform/resolvers/zod';
import { useForm, type UseFormReturn } from 'react-hook-form';
import { CheckThresholds } from '../../../../api/contract/checks.ts';
import type { StudioChecks } from '../../../../api/contract/studios.ts';
import { Button } from '../../ui/button.tsx';
import { Field } from '../../ui/field.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import { FormError } from '../sign-in/form-field.tsx';
import { landErrors } from '../sign-in/land-errors.ts';
import { limitsWords, THRESHOLD_GROUPS, type ThresholdField } from './threshold-fields.ts';

type Form = UseFormReturn<CheckThresholds>;

interface Props {
  checks: StudioChecks;
  /** Saves and gives the thresholds as they then are; rejects with what the server said. */
  onSave: (thresholds: CheckThresholds) => Promise<StudioChecks>;
}

/** From where on frames are pointed out. Read by everybody of the studio, changed by its owner. */
export function ThresholdsForm({ checks, onSave }: Props) {
  const form = useForm<CheckThresholds>({ resolver: zodResolver(CheckThresholds), defaultValues: checks.thresholds });
  const fixed = !checks.can.change;
  const submit = form.handleSubmit((thresholds) =>
    onSave(thresholds)
      .then((saved) => form.reset(saved.thresholds))
      .catch((error: unknown) => landErrors(form, error)),
  );
  const takeDefaults = () => {
    for (const { fields } of THRESHOLD_GROUPS) {
      for (const { name } of fields) form.setValue(name, checks.defaults[name], { shouldDirty: true, shouldValidate: true });
    }
  };
  return (
    <form noValidate className="grid max-w-4xl gap-6" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      {THRESHOLD_GROUPS.map(({ title, words, fields }) => (
        <fieldset key={title} className="border-t border-ink pt-3">
          <legend className="float-left w-full text-17 font-bold">{title}</legend>
          <p className="clear-both max-w-2xl text-mute">{words}</p>
          <div className="grid items-end gap-x-8 gap-y-4 pt-3 md:grid-cols-2">
            {fields.map((field) => (
              <Threshold key={field.name} form={form} field={field} usual={checks.defaults[field.name]} fixed={fixed} />
            ))}
          </div>
        </fieldset>
      ))}
      {fixed ? (
        <p className="text-mute">Only the owner of the studio changes these.</p>
      ) : (
        <div className="flex flex-wrap gap-2">
          <Button type="submit" tone="first" busy={form.formState.isSubmitting}>
            Save
          </Button>
          <Button onClick={takeDefaults}>Take the defaults</Button>
        </div>
      )}
    </form>
  );
}

interface ThresholdProps {
  form: Form;
  field: ThresholdField;
  usual: number;
  fixed: boolean;
}

function Threshold({ form, field, usual, fixed }: ThresholdProps) {
  const { name, label, before, unit, hint, commonPractice } = field;
  const { error } = form.getFieldState(name, form.formState);
  // What the schema says of a number that is none, or beyond its limits, is no sentence for people.
  const wrong = error && (error.type === 'custom' ? error.message : limitsWords(field));
  const origin = `Default ${before ?? ''}${before === 'ISO' ? ' ' : ''}${usual}${commonPractice ? ', common practice' : ''}.`;
  return (
    <Field label={label} hint={[hint, origin].filter(Boolean).join(' ')} error={wrong}>
      {(control) => (
        <span className="flex items-center gap-2">
          {before ? <span aria-hidden="true">{before}</span> : null}
          <TextInput
            {...control}
            {...form.register(name, { valueAsNumber: true })}
            type="number"
            step="any"
            inputMode="decimal"
            readOnly={fixed}
            aria-label={[label, before, unit].filter(Boolean).join(', ')}
            className="w-32!"
          />
          {unit ? <span aria-hidden="true">{unit}</span> : null}
        </span>
      )}
    </Field>
  );
}
