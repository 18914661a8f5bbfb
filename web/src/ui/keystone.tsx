import { useTranslation } from 'react-i18next';
import { joinClasses } from './join-classes.ts';

interface Props {
  number: number;
  /** Beyond the allowance: hatched instead of filled, and called an extra. */
  extra?: boolean;
  size?: 'small' | 'normal' | 'large';
  className?: string;
  /** True where the words beside it say the same already. */
  silent?: boolean;
}

const WIDTHS = { small: 44, normal: 60, large: 88 };
/** Of the number, in CSS pixels. */
const LETTERS = { small: 13, normal: 15, large: 17 };
const WEDGE = 'M0 0H60L48 32H12Z';

/** The mark of a pick: the wedge at the crown of an arch, with the pick's number in it. */
export function Keystone({ number, extra = false, size = 'normal', className, silent }: Props) {
  const { t } = useTranslation();
  const words = t(extra ? 'ui.extraPick' : 'ui.pick', { number });
  const width = WIDTHS[size];
  return (
    <svg
      width={width}
      height={(width * 32) / 60}
      viewBox="0 0 60 32"
      className={joinClasses('block', className)}
      {...(silent ? { 'aria-hidden': true } : { role: 'img', 'aria-label': words })}
    >
      <path d={WEDGE} className={extra ? 'fill-sheet' : 'fill-copper'} />
      {extra ? <Hatching /> : null}
      <text
        x="30"
        y="16"
        textAnchor="middle"
        dominantBaseline="central"
        fontSize={(LETTERS[size] * 60) / width}
        className={joinClasses('font-black', extra ? 'fill-copper' : 'fill-sheet')}
      >
        {number}
      </text>
    </svg>
  );
}

/** Lines at 45° inside the wedge that leave the middle free for the number. */
function Hatching() {
  return (
    <g className="stroke-copper" strokeWidth={2} fill="none">
      <path d="M1 1H59L47.5 31H12.5Z" />
      <path d="M3 6L8 1M6 13L18 1M9 20L16 13M11 28L17 22M44 1L42 3M54 1L44 11M57 8L44 21M52 23L44 31" strokeWidth={1.6} />
    </g>
  );
}
