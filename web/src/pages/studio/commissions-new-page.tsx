import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useForm, type UseFormReturn } from 'react-hook-form';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { z } from 'zod';
import { AddClient, AddContact } from '../../../../api/contract/clients.ts';
import type { CommissionDetail } from '../../../../api/contract/commissions.ts';
import type { Me } from '../../../../api/contract/sign-in.ts';
import { clientKeys } from '../../features/clients/queries.ts';
import { ClientChoice, type ClientFields, NEW_CLIENT } from '../../features/commissions/client-choice.tsx';
import { CommissionFields, type TypedFields } from '../../features/commissions/commission-fields.ts';
import { CommissionInputs } from '../../features/commissions/commission-inputs.tsx';
import { commissionKeys } from '../../features/commissions/queries.ts';
import { FormError, FormField } from '../../features/sign-in/form-field.tsx';
import { landErrors } from '../../features/sign-in/land-errors.ts';
import { meQuery } from '../../features/sign-in/queries.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { QueryView } from '../../ui/query-view.tsx';

const ForWhom = z
  .object({
    clientId: z.string().min(1, 'Choose the client.'),
    clientName: z.string().trim(),
    contactName: z.string().trim(),
    contactEmail: z.string().trim(),
  })
  .superRefine(({ clientId, clientName, contactName, contactEmail }, check) => {
    if (clientId !== NEW_CLIENT) return;
    const name = AddClient.shape.name.safeParse(clientName);
    if (!name.success) check.addIssue({ code: 'custom', path: ['clientName'], message: name.error.issues[0]?.message ?? '' });
    if (!contactName && !contactEmail) return;
    for (const { path, message } of AddContact.safeParse({ name: contactName, email: contactEmail }).error?.issues ?? []) {
      check.addIssue({ code: 'custom', path: [path[0] === 'email' ? 'contactEmail' : 'contactName'], message });
    }
  });
const Fields = z.intersection(CommissionFields, ForWhom);
type Typed = z.input<typeof Fields>;
type Values = z.output<typeof Fields>;

function bodyOf({ clientId, clientName, contactName, contactEmail, extraPrice, currency, ...fields }: Values, mayPrice: boolean) {
  const contacts = contactName ? [{ name: contactName, email: contactEmail }] : [];
  return {
    ...fields,
    ...(clientId === NEW_CLIENT ? { client: { name: clientName, contacts } } : { clientId }),
    ...(mayPrice ? { extraPrice, currency } : {}),
  };
}

/** /commissions/new */
export function Component() {
  return (
    <>
      <PageTitle title="New commission" className="mb-4" />
      <QueryView query={useQuery(meQuery)}>{(me) => <NewCommission me={me} />}</QueryView>
    </>
  );
}

function NewCommission({ me }: { me: Me }) {
  const [address] = useSearchParams();
  const navigate = useNavigate();
  const queries = useQueryClient();
  const form = useForm<Typed, unknown, Values>({
    resolver: zodResolver(Fields),
    defaultValues: {
      title: '',
      brief: '',
      shotOn: '',
      dueOn: '',
      allowance: '0',
      price: '',
      currency: me.studio.currency,
      clientId: address.get('client') ?? '',
      clientName: '',
      contactName: '',
      contactEmail: '',
    },
  });
  const submit = form.handleSubmit(async (values) => {
    try {
      const made = await api.post<CommissionDetail>('/api/commissions', bodyOf(values, me.can.money));
      void queries.invalidateQueries({ queryKey: commissionKeys.lists });
      void queries.invalidateQueries({ queryKey: clientKeys.all });
      await navigate(`/commissions/${made.id}/brief`);
    } catch (error) {
      landErrors(form, error);
    }
  });
  return (
    <form noValidate className="grid max-w-2xl gap-4 border border-ink bg-sheet p-5" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      <FormField form={form as unknown as UseFormReturn<TypedFields>} name="title" label="Title" autoComplete="off" />
      <ClientChoice form={form as unknown as UseFormReturn<ClientFields>} />
      <CommissionInputs form={form as unknown as UseFormReturn<TypedFields>} mayPrice={me.can.money} />
      <div className="flex justify-end gap-2">
        <LinkButton to="/commissions">Cancel</LinkButton>
        <Button type="submit" tone="first" busy={form.formState.isSubmitting}>
          Begin commission
        </Button>
      </div>
    </form>
  );
}
