import { useSyncExternalStore } from 'react';

/** A choice among a few that this browser keeps, the same in every part of the page. */
export interface KeptChoice<Option extends string> {
  now: () => Option;
  choose: (option: Option) => void;
  listen: (hear: () => void) => () => void;
}

/**
 * Keeps a choice in the browser's store under that key. What a browser forgets (a private window, a full store) is chosen anew;
 * nothing else may depend on it.
 */
export function keptChoice<Option extends string>(key: string, options: readonly Option[], first: Option): KeptChoice<Option> {
  const hearers = new Set<() => void>();
  let chosen: Option | undefined;
  return {
    now: () => (chosen ??= options.find((option) => option === recall(key)) ?? first),
    choose(option) {
      chosen = option;
      keep(key, option);
      hearers.forEach((hear) => hear());
    },
    listen(hear) {
      hearers.add(hear);
      return () => hearers.delete(hear);
    },
  };
}

function recall(key: string): string | null {
  try {
    return localStorage.getItem(key);
  } catch {
    return null;
  }
}

function keep(key: string, option: string): void {
  try {
    localStorage.setItem(key, option);
  } catch {
    // Kept for this page alone.
  }
}

/** The option chosen now and the way to choose another. */
export function useKept<Option extends string>(choice: KeptChoice<Option>): [Option, (option: Option) => void] {
  return [useSyncExternalStore(choice.listen, choice.now), choice.choose];
}

/** The one after it, for a key that goes round. */
export function nextOf<Option extends string>(options: readonly Option[], now: Option): Option {
  return options[(options.indexOf(now) + 1) % options.length] ?? now;
}
