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
}

/** Sets or takes back one's own mark. A lead picks, a reviewer marks. */
export function MarkButton({ number, marks, role, onMark, className }: Props) {
  const { t } = useTranslation();
  const verb = role === 'lead' ? (marks.mine ? 'picked' : 'pick') : marks.mine ? 'marked' : 'mark';
  return (
    <Button
      size="small"
      tone={marks.mine ? 'picked' : 'plain'}
      aria-pressed={marks.mine}
      aria-label={t(`marks.${verb}Proof`, { number })}
      className={className}
      onClick={() => onMark(!marks.mine)}
    >
      {t(`marks.${verb}`)}
    </Button>
  );
}
