import { useTranslation } from 'react-i18next';
import type { GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { allowanceState } from '../../../../api/domain/allowance.ts';
import { formatPrice } from '../../lib/money.ts';
import { LinkButton } from '../../ui/link-button.tsx';

interface Props {
  sheet: GuestSheet;
  picked: number;
  /** Marks of one's own, for a reviewer. */
  mine: number;
}

/** The counts at the lower edge, and the next step of the lead. */
export function SheetFoot({ sheet, picked, mine }: Props) {
  const { t } = useTranslation();
  const state = allowanceState(picked, { included: sheet.allowance, extraPrice: sheet.extraPrice });
  const rest =
    state.extras > 0
      ? t('foot.extras', { count: state.extras, cost: formatPrice(state.cost, sheet.currency) })
      : t('foot.left', { count: state.left });
  const leads = sheet.people.filter((person) => person.role === 'lead').map((person) => person.name);
  return (
    <div className="flex min-h-11 items-center justify-between gap-4">
      <div>
        <p role="status">
          <b>{t('allowance.picked', { count: picked })}</b>
          <span className="text-mute">
            <span className={state.extras > 0 ? undefined : 'max-sm:sr-only'}> · {rest}</span>
            {state.extras > 0 ? null : (
              <span aria-hidden="true" className="sm:hidden">
                {' '}
                {t('foot.ofIncluded', { included: sheet.allowance })}
              </span>
            )}
            {sheet.me.role === 'reviewer' ? ` · ${t('foot.mine', { count: mine })}` : ''}
          </span>
        </p>
        {sheet.me.role === 'reviewer' && sheet.state === 'Open' ? (
          <p className="text-13 text-mute">{t('foot.leadSends', { names: leads.join(', ') || t('foot.theLead') })}</p>
        ) : null}
      </div>
      {sheet.me.role === 'lead' && (sheet.can.send || sheet.state === 'Sent') ? (
        <LinkButton to={`/sheets/${sheet.id}/review`} tone={sheet.can.send ? 'first' : 'plain'}>
          {t(sheet.can.send ? 'foot.review' : 'foot.whatWasSent')}
        </LinkButton>
      ) : null}
    </div>
  );
}
