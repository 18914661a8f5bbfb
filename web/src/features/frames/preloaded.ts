import { useEffect } from 'react';

/** Has the browser fetch pictures that are likely to be looked at next. */
export function usePreloaded(addresses: readonly (string | undefined)[]): void {
  const wanted = addresses.filter((address) => address !== undefined).join('\n');
  useEffect(() => {
    const pictures = wanted.split('\n').map((address) => {
      const picture = new Image();
      if (address !== '') picture.src = address;
      return picture;
    });
    // Leaving quickly must not keep the line busy with what nobody waits for.
    return () => pictures.forEach((picture) => picture.removeAttribute('src'));
  }, [wanted]);
}
