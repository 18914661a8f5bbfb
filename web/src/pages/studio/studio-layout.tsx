import { Outlet } from 'react-router-dom';
import { AccountCorner } from '../../features/sign-in/account-corner.tsx';
import { SessionGate } from '../../features/sign-in/session-gate.tsx';
import { StudioShell } from '../../ui/studio-shell.tsx';

/** Around every page of the studio. */
export function Component() {
  return (
    <SessionGate>
      {(me) => (
        <StudioShell account={<AccountCorner me={me} />}>
          <Outlet />
        </StudioShell>
      )}
    </SessionGate>
  );
}
