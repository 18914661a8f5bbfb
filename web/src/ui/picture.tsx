import { useState } from 'react';
import { joinClasses } from './join-classes.ts';
import { thumbhashAddress } from './thumbhash-address.ts';

export interface PictureSource {
  /** Addresses of the derivatives; a missing one is not offered to the browser. */
  small?: string | null | undefined;
  medium?: string | null | undefined;
  /** Pixels of the upright picture, for its proportions. */
  width: number;
  height: number;
  /** base64 */
  thumbhash?: string | null | undefined;
}

interface Props {
  source: PictureSource;
  /** What the picture shows; empty where the words beside it say so. */
  alt: string;
  /** CSS pixels it is drawn at; picks the derivative. */
  drawnWidth: number;
  /** eager: the first row of a page. */
  loading?: 'lazy' | 'eager';
  /** Told when the address led nowhere: it may have run out. */
  onFailed?: () => void;
  className?: string;
}

/** The real width of a derivative whose long edge is `edge`, never above the picture itself. */
export function derivativeWidth(source: PictureSource, edge: number): number {
  const long = Math.max(source.width, source.height, 1);
  return Math.max(1, Math.round((source.width * Math.min(edge, long)) / long));
}

function srcSet(source: PictureSource): string | undefined {
  const offers = [
    source.small ? `${source.small} ${derivativeWidth(source, 480)}w` : '',
    source.medium ? `${source.medium} ${derivativeWidth(source, 960)}w` : '',
  ].filter(Boolean);
  return offers.length > 1 ? offers.join(', ') : undefined;
}

/** A picture in its own proportions, never cropped, on its blurred placeholder, so that nothing jumps when it arrives. */
export function Picture({ source, alt, drawnWidth, loading = 'lazy', onFailed, className }: Props) {
  const [failed, setFailed] = useState<string>();
  const placeholder = thumbhashAddress(source.thumbhash);
  const address = source.small ?? source.medium;
  return (
    <span
      className={joinClasses('relative block overflow-hidden bg-line bg-cover', className)}
      style={{ aspectRatio: `${source.width} / ${source.height}`, ...(placeholder ? { backgroundImage: `url(${placeholder})` } : {}) }}
    >
      {address && failed !== address ? (
        <img
          src={address}
          srcSet={srcSet(source)}
          sizes={`${Math.ceil(drawnWidth)}px`}
          width={source.width}
          height={source.height}
          alt={alt}
          loading={loading}
          decoding="async"
          draggable={false}
          className="absolute inset-0 size-full"
          onError={() => {
            setFailed(address);
            onFailed?.();
          }}
        />
      ) : (
        <span {...(alt ? { role: 'img', 'aria-label': alt } : {})} className="absolute inset-0" />
      )}
    </span>
  );
}
