import { useQuery } from '@tanstack/react-query';
import { useRef } from 'react';
import type { PickListDetail } from '../../../../api/contract/pick-lists.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { QueryView } from '../../ui/query-view.tsx';
import { TextArea } from '../../ui/text-input.tsx';

async function fetchNames(pickListId: string, signal: AbortSignal): Promise<string> {
  const response = await fetch(`/api/pick-lists/${pickListId}/names`, { signal });
  if (!response.ok) throw new Error('The names could not be read.');
  return response.text();
}

/** The picked frames' names for the search box of a raw converter or file manager. */
export function NamesDialog({ list, onClose }: { list: PickListDetail; onClose: () => void }) {
  const query = useQuery({ queryKey: ['pick-lists', list.id, 'names'], queryFn: ({ signal }) => fetchNames(list.id, signal) });
  const box = useRef<HTMLTextAreaElement>(null);
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(query.data ?? '');
      showNotice(`${list.pickCount} names are on the clipboard.`);
      onClose();
    } catch {
      // Without https a browser keeps the clipboard to itself: select the names, so that one key copies them.
      box.current?.select();
    }
  };
  return (
    <Dialog
      open
      title={`File names of pick list ${list.number}`}
      onClose={onClose}
      actions={
        <Button tone="first" disabled={!query.data} onClick={() => void copy()}>
          Copy
        </Button>
      }
    >
      <QueryView query={query}>
        {(names) => (
          <Field label="Names" hint="Without their endings, ready for the search box of your raw converter.">
            {(control) => <TextArea {...control} ref={box} readOnly rows={6} value={names} onFocus={(event) => event.target.select()} />}
          </Field>
        )}
      </QueryView>
    </Dialog>
  );
}
