import { useState } from 'react';
import type { ChangeFinal, FinalItem, FinalList } from '../../../../api/contract/finals.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { Select } from '../../ui/select.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import { pickWords, sheetCount } from './final-words.ts';
import { useFinalDeed } from './mutations.ts';

interface Props {
  commissionId: string;
  final: FinalItem;
  list: FinalList;
  onClose: () => void;
}

const NONE = 'none';

/** The title of a final and the pick it belongs to. */
export function ChangeFinalDialog({ commissionId, final, list, onClose }: Props) {
  const deeds = useFinalDeed(commissionId);
  const [title, setTitle] = useState(final.ownTitle ? final.title : '');
  const [frame, setFrame] = useState(final.frameId ?? NONE);
  const sheets = sheetCount(list.picks);
  const taken = list.picks.find((pick) => pick.frameId === frame)?.finalId;
  const joins = taken !== undefined && taken !== null && taken !== final.id;
  const choices = [
    ...list.picks.map((pick) => ({ value: pick.frameId, words: pickWords(pick, sheets) })),
    { value: NONE, words: 'Not one of the picks' },
  ];
  const save = () => {
    const input: ChangeFinal = {
      title: title.trim(),
      ...(frame === (final.frameId ?? NONE) ? {} : { frameId: frame === NONE ? null : frame }),
    };
    deeds.mutate({ what: 'change', final, input }, { onSuccess: onClose });
  };
  return (
    <Dialog
      open
      title={final.versions[0]?.name ?? final.title}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button tone="first" busy={deeds.isPending} onClick={save}>
            Save
          </Button>
        </>
      }
    >
      <div className="grid gap-4">
        <Field
          label="Title"
          optional="may stay empty"
          hint="Your client reads it below the picture. Without one it is the view’s, or the file’s name."
        >
          {(control) => (
            <TextInput
              {...control}
              maxLength={200}
              placeholder={final.ownTitle ? '' : final.title}
              value={title}
              onChange={(event) => setTitle(event.target.value)}
            />
          )}
        </Field>
        {list.picks.length > 0 ? (
          <Field label="Belongs to">
            {(control) => <Select {...control} choices={choices} value={frame} onChange={(event) => setFrame(event.target.value)} />}
          </Field>
        ) : null}
        {joins ? <p className="text-copper">This pick has a final already: this file becomes its newest version.</p> : null}
      </div>
    </Dialog>
  );
}
