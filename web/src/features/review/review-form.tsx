import { useRef, useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { GuestProof } from '../../../../api/contract/guest-sheets.ts';
import { allowanceState } from '../../../../api/domain/allowance.ts';
import { ApiProblem } from '../../lib/api.ts';
import { formatPrice } from '../../lib/money.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { TextArea } from '../../ui/text-input.tsx';
import type { SheetData } from '../sheets-guest/sheet-door.tsx';
import { comparePicks, type PickChanges } from './compare-picks.ts';
import { Sums } from './sums.tsx';
import { useSend } from './use-send.ts';

const LONGEST = 4000;

interface Props {
  data: SheetData;
  picks: readonly GuestProof[];
}

/** What it comes to, a message, and the button that sends. Asks once more before sending, because it closes the sheet. */
export function ReviewForm({ data, picks }: Props) {
  const { t } = useTranslation();
  const { sheet, proofs } = data;
  const [words, setWords] = useState('');
  /** The picks as they were when the question was opened: only these are ever sent. */
  const [asked, setAsked] = useState<readonly GuestProof[]>();
  const send = useSend(sheet.id);
  /** Set at once, where the mutation's own state comes a moment later: the second press of a double click is none. */
  const sending = useRef(false);
  const state = allowanceState(asked?.length ?? picks.length, { included: sheet.allowance, extraPrice: sheet.extraPrice });
  const now = new Set(picks.map((pick) => pick.id));
  const changes = asked ? comparePicks(proofs, new Set(asked.map((pick) => pick.id)), now) : { added: [], gone: [] };
  const changed = changes.added.length + changes.gone.length > 0;
  const refused = send.error instanceof ApiProblem ? send.error.detail : send.error ? t('page.broken') : undefined;

  return (
    <div className="content-start lg:sticky lg:top-4">
      <Sums
        picks={picks.length}
        included={sheet.allowance}
        extraPrice={sheet.extraPrice}
        currency={sheet.currency}
        studio={sheet.studio.name}
      />
      <Field label={t('review.message')} optional={t('ui.optional')} hint={t('review.messageHint')} className="mt-4">
        {(control) => (
          <TextArea {...control} value={words} maxLength={LONGEST} rows={5} onChange={(event) => setWords(event.target.value)} />
        )}
      </Field>
      <Button tone="first" className="mt-4 w-full" disabled={picks.length === 0} onClick={() => setAsked(picks)}>
        {picks.length === 0 ? t('review.nothing') : t('review.send', { picks: t('counts.picks', { count: picks.length }) })}
      </Button>
      <ConfirmDialog
        open={asked !== undefined}
        title={t('review.askTitle', { picks: t('counts.picks', { count: asked?.length ?? 0 }), studio: sheet.studio.name })}
        confirm={changed ? t('review.lookAgain') : t('review.confirm')}
        dangerous={false}
        busy={send.isPending}
        error={changed ? undefined : refused}
        onClose={() => {
          setAsked(undefined);
          send.reset();
        }}
        onConfirm={() => {
          if (changed) setAsked(picks);
          else if (asked && !sending.current) {
            sending.current = true;
            send.mutate({ proofs: asked, words }, { onSettled: () => (sending.current = false) });
          }
        }}
      >
        {changed ? <Changed changes={changes} /> : null}
        {state.extras > 0 ? (
          <p className="mb-2">{t('review.askExtras', { count: state.extras, cost: formatPrice(state.cost, sheet.currency) })}</p>
        ) : null}
        <p>{t('review.askWords', { studio: sheet.studio.name })}</p>
      </ConfirmDialog>
    </div>
  );
}

/** Said where another person, or the other window, changed the picks while the question stood. */
function Changed({ changes }: { changes: PickChanges }) {
  const { t } = useTranslation();
  const numbers = (some: GuestProof[]) => some.map((proof) => proof.number).join(', ');
  return (
    <div role="alert" className="mb-3 border-l-4 border-copper bg-copper-soft px-3 py-2">
      <b>{t('review.changed')}</b>
      {changes.added.length > 0 ? <p>{t('review.added', { numbers: numbers(changes.added) })}</p> : null}
      {changes.gone.length > 0 ? <p>{t('review.gone', { numbers: numbers(changes.gone) })}</p> : null}
    </div>
  );
}
