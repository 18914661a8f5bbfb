import type { ReactNode } from 'react';
import { NavLink } from 'react-router-dom';
import { joinClasses } from './join-classes.ts';
import { Logo } from './logo.tsx';

export interface NavigationEntry {
  to: string;
  words: string;
}

/** What stands in the navigation; an entry is added with its feature. */
const ENTRIES: NavigationEntry[] = [
  { to: '/desk', words: 'Desk' },
  { to: '/commissions', words: 'Commissions' },
  { to: '/clients', words: 'Clients' },
  { to: '/settings', words: 'Settings' },
];

interface StudioShellProps {
  /** Below the navigation: who is signed in, and the way out. */
  account?: ReactNode;
  entries?: NavigationEntry[];
  children: ReactNode;
}

/** The frame of the studio's pages: navigation at the left from 768 px, a row across the top below that. */
export function StudioShell({ account, entries = ENTRIES, children }: StudioShellProps) {
  return (
    <div className="md:grid md:min-h-dvh md:grid-cols-[160px_minmax(0,1fr)] lg:grid-cols-[192px_minmax(0,1fr)]">
      <header className="flex flex-wrap items-center border-b border-ink bg-sheet md:sticky md:top-0 md:h-dvh md:flex-col md:flex-nowrap md:items-stretch md:border-r md:border-b-0">
        <p className="flex items-center gap-2.5 px-5 py-3 text-22 font-black md:pt-5 md:pb-4">
          <Logo />
          Oriel
        </p>
        <nav aria-label="Studio" className="max-md:order-last max-md:w-full flex flex-wrap md:block">
          {entries.map((entry) => (
            <NavLink
              key={entry.to}
              to={entry.to}
              className={({ isActive }) =>
                joinClasses('target flex items-center px-5 py-2 md:h-10', isActive ? 'bg-ink font-bold text-sheet' : 'hover:bg-hair')
              }
            >
              {entry.words}
            </NavLink>
          ))}
        </nav>
        {account ? <div className="ml-auto px-4 py-2 text-13 text-mute md:mt-auto md:ml-0 md:p-5">{account}</div> : null}
      </header>
      <main id="content" tabIndex={-1} className="min-w-0 px-4 pt-5 pb-16 lg:px-8">
        {children}
      </main>
    </div>
  );
}
