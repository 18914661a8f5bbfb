import { useTranslation } from 'react-i18next';
import { fitForUse, ppiSeenFrom, sayLargest, sayPpi, type Fit, type PictureSize, type Use } from '../../../../api/domain/fit-for-use.ts';
import { PanelLine, PanelSection } from './panel-section.tsx';

interface Props {
  /** Pixels of the finished picture, upright. */
  picture: PictureSize;
  uses: readonly Use[];
}

/** What a picture is good for: each use of the studio with "sharp", or with what is there and the largest size that is sharp. */
export function FitForUse({ picture, uses }: Props) {
  const { t } = useTranslation();
  if (uses.length === 0) return null;
  const [width, height] = [picture.width, picture.height].map((pixels) => pixels.toLocaleString('en-GB'));
  return (
    <PanelSection title={t('fit.title')}>
      <dl>
        {uses.map((use) => (
          <PanelLine key={use.id} what={use.kind === 'page' ? t('fit.page', { title: use.title, ppi: use.ppi }) : use.title}>
            <Answer fit={fitForUse(picture, use)} />
          </PanelLine>
        ))}
      </dl>
      <p className="mt-1.5 text-mute">
        {t('fit.pixels', { width, height })} {t('fit.caution')}
      </p>
      <Why />
    </PanelSection>
  );
}

function Answer({ fit }: { fit: Fit }) {
  const { t } = useTranslation();
  if (fit.sharp) return <b className="text-verdigris">{t('fit.sharp')}</b>;
  return (
    <>
      <b className="text-copper">{fit.kind === 'print' ? t('fit.ppi', { ppi: sayPpi(fit.ppi) }) : t('fit.tooSmall')}</b>
      <span className="block">{t('fit.upTo', { size: sayLargest(fit) })}</span>
    </>
  );
}

const TEN_METRES = 10_000;

function Why() {
  const { t } = useTranslation();
  return (
    <details className="mt-1">
      <summary className="target flex items-center underline underline-offset-4">{t('fit.why')}</summary>
      <div className="grid gap-2 pb-1 text-mute">
        <p>{t('fit.hand')}</p>
        <p>{t('fit.far', { ppi: sayPpi(ppiSeenFrom(TEN_METRES)) })}</p>
        <p>{t('fit.screen')}</p>
      </div>
    </details>
  );
}
