import { useTranslation } from 'react-i18next';
import { allowanceState } from '../../../../api/domain/allowance.ts';
import { formatPrice } from '../../lib/money.ts';

interface Props {
  picks: number;
  included: number;
  /** Minor units. */
  extraPrice: number;
  currency: string;
  studio: string;
}

/** What the picks come to: how many, how many of them are included, how many extra, and what those cost. */
export function Sums({ picks, included, extraPrice, currency, studio }: Props) {
  const { t } = useTranslation();
  const state = allowanceState(picks, { included, extraPrice });
  const rows: [string, string][] = [
    [t('review.picks'), String(picks)],
    [t('review.included'), t('review.ofIncluded', { used: picks - state.extras, included })],
    [t('review.extras'), state.extras > 0 ? t('review.times', { count: state.extras, price: formatPrice(extraPrice, currency) }) : '0'],
  ];
  return (
    <div className="border border-ink bg-sheet px-4 py-3">
      <dl>
        {rows.map(([label, value]) => (
          <div key={label} className="flex justify-between gap-4 border-b border-hair py-1.5">
            <dt>{label}</dt>
            <dd className="text-right">{value}</dd>
          </div>
        ))}
        <div className="flex justify-between gap-4 py-1.5 text-17 font-bold">
          <dt>{t('review.cost')}</dt>
          <dd>{formatPrice(state.cost, currency)}</dd>
        </div>
      </dl>
      {state.cost > 0 ? <p className="text-13 text-mute">{t('review.costWords', { studio })}</p> : null}
    </div>
  );
}
