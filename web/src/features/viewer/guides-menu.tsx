import { useTranslation } from 'react-i18next';
import { Menu } from '../../ui/menu.tsx';
import { GUIDES, type Guides } from './guides.ts';

interface Props {
  guides: Guides;
  onChoose: (guides: Guides) => void;
}

/** Chooses the lines over the picture. Where room is short the button names itself alone. */
export function GuidesMenu({ guides, onChoose }: Props) {
  const { t } = useTranslation();
  return (
    <Menu
      label={
        <span>
          {t('guides.label')}
          <span className="max-lg:sr-only">: {t(`guides.${guides}`)}</span>
        </span>
      }
      entries={GUIDES.map((one) => ({ words: t(`guides.${one}`), chosen: one === guides, onChoose: () => onChoose(one) }))}
    />
  );
}
