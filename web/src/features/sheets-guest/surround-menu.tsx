import { useTranslation } from 'react-i18next';
import { Menu } from '../../ui/menu.tsx';
import { SURROUNDS, type Surround } from './surround.ts';

interface Props {
  surround: Surround;
  onChoose: (surround: Surround) => void;
}

/** Chooses what lies around the pictures. */
export function SurroundMenu({ surround, onChoose }: Props) {
  const { t } = useTranslation();
  return (
    <Menu
      label={
        <>
          <span className="max-sm:sr-only">{t('surround.label')}: </span>
          {t(`surround.${surround}`)}
        </>
      }
      entries={SURROUNDS.map((one) => ({ words: t(`surround.${one}`), chosen: one === surround, onChoose: () => onChoose(one) }))}
    />
  );
}
