import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { Watermark } from '../../../../api/contract/watermark.ts';
import { Failure } from '../../ui/query-view.tsx';

/** While a slider moves, the picture is asked for when it rests. */
const REST_MS = 250;

function useRested<T>(value: T): T {
  const [rested, setRested] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setRested(value), REST_MS);
    return () => clearTimeout(timer);
  }, [value]);
  return rested;
}

function asAddress(picture: Blob): Promise<string> {
  return new Promise((resolve, reject) => {
    const reader = new FileReader();
    reader.onload = () => resolve(String(reader.result));
    reader.onerror = () => reject(new Error('The watermark could not be shown.'));
    reader.readAsDataURL(picture);
  });
}

/** The preview as an address that a picture can show. */
async function fetchPreview(watermark: Watermark, frameId: string | undefined, signal: AbortSignal): Promise<string> {
  const response = await fetch('/api/studio/watermark-previews', {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ watermark, ...(frameId ? { frameId } : {}) }),
    signal,
  });
  if (!response.ok) throw new Error('The watermark could not be drawn.');
  return asAddress(await response.blob());
}

function complete(watermark: Watermark): boolean {
  if (watermark.kind === 'text') return watermark.text.trim() !== '';
  return watermark.kind === 'none' || Boolean(watermark.imageKey);
}

/** The watermark on one of the studio's own frames, drawn by the same code that makes the proofs. */
export function WatermarkPreview({ watermark, frameId }: { watermark: Watermark; frameId?: string | undefined }) {
  const rested = useRested(watermark);
  const query = useQuery({
    queryKey: ['watermark-preview', rested, frameId],
    queryFn: ({ signal }) => fetchPreview(rested, frameId, signal),
    enabled: complete(rested),
    placeholderData: keepPreviousData,
    staleTime: Infinity,
    gcTime: 60_000,
    retry: false,
  });
  if (query.isError) return <Failure error={query.error} onRetry={() => void query.refetch()} />;
  return (
    <div aria-busy={query.isFetching} className="min-h-40 bg-grey">
      {query.data ? <img src={query.data} alt="A frame with this watermark" className="block h-auto w-full" /> : null}
    </div>
  );
}
