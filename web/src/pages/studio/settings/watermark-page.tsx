import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { Watermark } from '../../../../../api/contract/watermark.ts';
import { WatermarkFields } from '../../../features/watermark/watermark-fields.tsx';
import { WatermarkPreview } from '../../../features/watermark/watermark-preview.tsx';
import { api } from '../../../lib/api.ts';
import { Button } from '../../../ui/button.tsx';
import { showNotice } from '../../../ui/notices.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';

const KEY = ['studio', 'watermark'] as const;

/** /settings/watermark: the watermark that new proof sheets begin with. */
export function Component() {
  const query = useQuery({ queryKey: KEY, queryFn: ({ signal }) => api.get<Watermark>('/api/studio/watermark', { signal }) });
  return (
    <>
      <PageTitle title="Watermark" where="Settings" hidden />
      <QueryView query={query}>{(watermark) => <WatermarkForm saved={watermark} />}</QueryView>
    </>
  );
}

function WatermarkForm({ saved }: { saved: Watermark }) {
  const client = useQueryClient();
  const [watermark, setWatermark] = useState(saved);
  const save = useMutation({
    mutationFn: () => api.put<Watermark>('/api/studio/watermark', watermark),
    onSuccess: (changed) => {
      client.setQueryData(KEY, changed);
      showNotice('New proof sheets begin with this watermark. Sheets that are there keep theirs.');
    },
  });
  const changed = JSON.stringify(watermark) !== JSON.stringify(saved);
  return (
    <form
      className="grid gap-6 md:grid-cols-[minmax(0,360px)_minmax(0,1fr)]"
      onSubmit={(event) => {
        event.preventDefault();
        save.mutate();
      }}
    >
      <div className="grid content-start gap-4 border border-ink bg-sheet px-4.5 py-4">
        <h2 className="text-17">Watermark of new proof sheets</h2>
        <WatermarkFields value={watermark} onChange={setWatermark} />
        {save.error ? (
          <p role="alert" className="font-bold text-copper">
            {save.error.message}
          </p>
        ) : null}
        <div>
          <Button type="submit" tone="first" disabled={!changed} busy={save.isPending}>
            Save
          </Button>
        </div>
      </div>
      <WatermarkPreview watermark={watermark} />
    </form>
  );
}
