import { useQuery } from '@tanstack/react-query';
import { NavLink, Outlet } from 'react-router-dom';
import { meQuery } from '../../../features/sign-in/queries.ts';

const TABS = [
  { to: 'studio', words: 'Studio' },
  { to: 'account', words: 'Your account' },
  { to: 'team', words: 'Team', owner: true },
  { to: 'watermark', words: 'Watermark' },
  { to: 'checks', words: 'Frame checks' },
  { to: 'uses', words: 'Uses' },
  { to: 'mail', words: 'Mail' },
  { to: 'storage', words: 'Storage' },
];

/** Around the pages of the settings: one line of where to go. */
export function Component() {
  const me = useQuery(meQuery);
  const tabs = TABS.filter((tab) => !tab.owner || me.data?.can.team);
  return (
    <>
      <nav aria-label="Settings" className="mb-6 flex flex-wrap border-b border-ink">
        {tabs.map((tab) => (
          <NavLink
            key={tab.to}
            to={`/settings/${tab.to}`}
            className={({ isActive }) =>
              `target flex h-10 items-center px-4 ${isActive ? 'bg-ink font-bold text-sheet' : 'hover:bg-hair'} -outline-offset-2`
            }
          >
            {tab.words}
          </NavLink>
        ))}
      </nav>
      <Outlet />
    </>
  );
}
