import { useEffect, useState } from 'react';
import { TextInput } from './text-input.tsx';

interface Props {
  /** Read out and shown as long as nothing is typed. */
  label: string;
  initial?: string;
  onSearch: (words: string) => void;
}

const REST_MS = 300;

/** Searches while one types, once the fingers rest. */
export function SearchField({ label, initial = '', onSearch }: Props) {
  const [typed, setTyped] = useState(initial);
  const [asked, setAsked] = useState(initial);
  useEffect(() => {
    if (typed.trim() === asked) return;
    const timer = setTimeout(() => {
      setAsked(typed.trim());
      onSearch(typed.trim());
    }, REST_MS);
    return () => clearTimeout(timer);
  }, [typed, asked, onSearch]);
  return (
    <TextInput
      type="search"
      aria-label={label}
      placeholder={label}
      value={typed}
      maxLength={200}
      className="max-w-sm"
      onChange={(event) => setTyped(event.target.value)}
    />
  );
}
