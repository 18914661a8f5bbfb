import { useRef, type ChangeEvent } from 'react';
import { filesOfInput, type FoundFile } from '../../lib/uploads/found-file.ts';
import { Button, type ButtonSize } from '../../ui/button.tsx';

interface Props {
  onFound: (files: FoundFile[]) => void;
  /** What the first button says: "Add frames". */
  words: string;
  size?: ButtonSize;
}

/** Two buttons that open the browser's own choosers: single files, and a whole folder. */
export function FileChoosers({ onFound, words, size = 'small' }: Props) {
  const files = useRef<HTMLInputElement>(null);
  const folder = useRef<HTMLInputElement>(null);
  const take = (event: ChangeEvent<HTMLInputElement>) => {
    if (event.target.files) onFound(filesOfInput(event.target.files));
    // The same files chosen once more must be a change again.
    event.target.value = '';
  };
  return (
    <>
      <input ref={files} type="file" multiple hidden aria-label={words} data-chooser="files" onChange={take} />
      <input
        ref={(input) => {
          folder.current = input;
          // React knows no such attribute for inputs.
          input?.setAttribute('webkitdirectory', '');
        }}
        type="file"
        hidden
        aria-label="Add a folder"
        data-chooser="folder"
        onChange={take}
      />
      <Button size={size} onClick={() => files.current?.click()}>
        {words}
      </Button>
      <Button size={size} onClick={() => folder.current?.click()}>
        Add a folder
      </Button>
    </>
  );
}
