import type { ReactNode } from 'react';
import { ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Door } from './door.tsx';

interface Props {
  error: Error;
  onRetry: () => void;
  /** What to do about a link that no longer works. */
  children?: ReactNode;
}

/** In place of a page whose link does not work: why, and what helps. */
export function LinkEnded({ error, onRetry, children }: Props) {
  const problem = error instanceof ApiProblem ? error : undefined;
  const ended = problem?.status === 404 || problem?.status === 410;
  return (
    <Door title={ended ? 'This link does not work' : 'This did not work'}>
      <p role="alert">{problem?.detail ?? 'The page could not be loaded. Please try again.'}</p>
      <div className="mt-4 flex flex-wrap gap-2">{ended ? children : <Button onClick={onRetry}>Try again</Button>}</div>
    </Door>
  );
}
