import { useTranslation } from 'react-i18next';
import type { GuestDelivery } from '../../../../api/contract/deliveries.ts';
import { AnchorButton } from '../../ui/link-button.tsx';
import { Picture } from '../../ui/picture.tsx';
import { sizeWords } from '../finals/final-words.ts';

export type GuestFile = GuestDelivery['files'][number];

/** Room below a picture for its caption, CSS pixels. */
export const CAPTION_HEIGHT = 80;

interface Props {
  file: GuestFile;
  box: { width: number; height: number };
  /** The first pictures of the page come at once. */
  first: boolean;
  onLook: () => void;
  onFailed: () => void;
}

/** A picture without watermark with its title, size and download. */
export function GuestFileTile({ file, box, first, onLook, onFailed }: Props) {
  const { t } = useTranslation();
  return (
    <figure>
      <button
        type="button"
        className="block w-full bg-line"
        style={{ height: box.height }}
        onClick={onLook}
        aria-label={t('delivery.look', { title: file.title })}
      >
        <Picture
          source={{ ...file, small: file.pictures?.['480'], medium: file.pictures?.['960'], thumbhash: file.placeholder }}
          alt=""
          drawnWidth={box.width}
          loading={first ? 'eager' : 'lazy'}
          onFailed={onFailed}
        />
      </button>
      <figcaption className="flex flex-wrap items-start justify-between gap-x-3 gap-y-1 pt-1.5 text-13">
        <span className="min-w-0 flex-1 basis-32">
          <b className="block truncate" title={file.title}>
            {file.title}
          </b>
          <span className="block text-mute">{sizeWords(file)}</span>
          {file.fetched ? <b className="block text-verdigris">{t('delivery.fetched')}</b> : null}
        </span>
        <AnchorButton size="small" href={file.download} download={file.name} aria-label={t('delivery.downloadOne', { title: file.title })}>
          {t('delivery.download')}
        </AnchorButton>
      </figcaption>
    </figure>
  );
}
