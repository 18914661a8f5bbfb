import { useTranslation } from 'react-i18next';
import type { GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { Button } from '../../ui/button.tsx';
import type { ProofMarks } from '../marks/read-marks.ts';

interface Props {
  number: number;
  marks: ProofMarks;
  role: GuestSheet['me']['role'];
  onMark: (wanted: boolean) => void;
  className?: string;
  /** The number of the pick, shown after the word. */
  place?: number | undefined;
  /** What a pick beyond the allowance costs, in words. */
  extra?: string | undefined;
}

/** Sets or takes back one's own mark. A lead picks, a reviewer marks. */
export function MarkButton({ number, marks, role, onMark, className, place, extra }: Props) {
  const { t } = useTranslation();
  const cost = extra ? `, ${t('foot.extras', { count: 1, cost: extra })}` : '';
  const numbered = marks.mine && place !== undefined ? ` · ${place}${cost}` : '';
  const verb = role === 'lead' ? (marks.mine ? 'picked' : 'pick') : marks.mine ? 'marked' : 'mark';
  return (
    <Button
      size="small"
      tone={marks.mine ? 'picked' : 'plain'}
      aria-pressed={marks.mine}
      aria-label={`${t(`marks.${verb}`)}${numbered}, ${t('proof.name', { number })}`}
      className={className}
      onClick={() => onMark(!marks.mine)}
    >
      {t(`marks.${verb}`)}
      {numbered}
    </Button>
  );
}
