import { Outlet } from 'react-router-dom';
import { StudioShell } from '../../ui/studio-shell.tsx';

/** Around every page of the studio. */
export function Component() {
  return (
    <StudioShell>
      <Outlet />
    </StudioShell>
  );
}
