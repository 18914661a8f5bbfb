import { useTranslation } from 'react-i18next';
import { joinClasses } from './join-classes.ts';

export interface AllowanceDrawing {
  /** Positions along the line in parts of it, 0 to 1. */
  fill: number;
  tick: number;
  /** Where the hatched part ends; equals `tick` without extras. */
  hatch: number;
}

/**
 * Where things stand on the line: the allowance fills three quarters of it while the picks fit, and yields room to
 * the extras beyond that, so that one hatch is never thinner than a pick.
 */
export function drawAllowance(picked: number, included: number): AllowanceDrawing {
  const beyond = Math.max(picked - included, 0);
  const length = Math.max(included / 0.75, included + beyond * 1.15, 1);
  return { fill: Math.min(picked, included) / length, tick: included / length, hatch: (included + beyond) / length };
}

interface Props {
  picked: number;
  included: number;
  /** The price of an extra in words ("£85"); null where further picks are free. */
  price: string | null;
  className?: string;
}

/** The allowance as an architect dimensions a wall: ticks at its ends, filled as far as it is used, extras hatched beyond it. */
export function DimensionLine({ picked, included, price, className }: Props) {
  const { t } = useTranslation();
  const drawing = drawAllowance(picked, included);
  const extra = picked - included;
  const percent = (part: number) => `${part * 100}%`;
  const summary =
    extra > 0 ? t('allowance.summaryExtra', { picked, included, count: extra }) : t('allowance.summary', { picked, included });
  const then = price === null ? t('allowance.noExtras') : t('allowance.then', { price });
  return (
    <div className={joinClasses('text-13', className)}>
      <p className="sr-only">
        {summary} {then}
      </p>
      <div aria-hidden="true" className="relative h-11">
        <p className="absolute top-0 left-0">
          <b>{t('allowance.picked', { count: picked })}</b>
          {extra > 0 ? t('allowance.extra', { count: extra }) : ` ${t('allowance.of', { included })}`}
        </p>
        <p
          className="absolute top-0 pl-1.5 whitespace-nowrap"
          style={{ left: `clamp(168px, ${percent(drawing.tick)}, calc(100% - 128px))` }}
        >
          {then}
        </p>
        <div className="absolute inset-x-0 top-[28px] border-t border-ink" />
        <div className="absolute top-[25px] left-0 h-[7px] bg-copper transition-[width]" style={{ width: percent(drawing.fill) }} />
        <div
          className="hatched absolute top-[25px] h-[7px] border-copper transition-[width]"
          style={{ left: percent(drawing.tick), width: percent(drawing.hatch - drawing.tick) }}
        />
        {[...new Set([0, drawing.tick, 1])].map((at) => (
          <i key={at} className="absolute top-5 h-[17px] border-l border-ink" style={at === 1 ? { right: 0 } : { left: percent(at) }} />
        ))}
      </div>
    </div>
  );
}
