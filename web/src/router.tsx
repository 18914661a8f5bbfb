import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { sheetLoader } from './features/sheets-guest/queries.ts';
import { queryClient } from './lib/query-client.ts';
import { BrokenPage } from './pages/broken-page.tsx';
import { NotFoundPage } from './pages/not-found-page.tsx';
import { Root } from './pages/root.tsx';
import { Pending } from './ui/pending.tsx';

/** Without a session: signing in and up, resetting, joining a studio. */
const doorPages: RouteObject[] = [];

/** The studio's pages, inside the shell with the navigation at the left. */
const studioPages: RouteObject[] = [
  {
    path: 'commissions/:commissionId',
    lazy: () => import('./pages/studio/commission/layout.tsx'),
    children: [
      {
        path: 'frames',
        lazy: () => import('./pages/studio/commission/frames-page.tsx'),
        children: [{ path: ':frameId', lazy: () => import('./pages/studio/commission/frames-viewer-page.tsx') }],
      },
      { path: 'proofs', lazy: () => import('./pages/studio/commission/proofs-page.tsx') },
      { path: 'proofs/:sheetId', lazy: () => import('./pages/studio/commission/proofs-page.tsx') },
      { path: 'picks', lazy: () => import('./pages/studio/commission/picks-page.tsx') },
    ],
  },
];

/** The guests' pages: sheets, deliveries and what they were ever invited to. */
const guestPages: RouteObject[] = [
  { path: 'open/:token', lazy: () => import('./pages/guest/open-page.tsx') },
  { path: 'mine', lazy: () => import('./pages/guest/mine-page.tsx') },
  { path: 'sheets/:sheetId/review', loader: sheetLoader(queryClient), lazy: () => import('./pages/guest/review-page.tsx') },
  { path: 'sheets/:sheetId', loader: sheetLoader(queryClient), lazy: () => import('./pages/guest/sheet-page.tsx') },
  { path: 'sheets/:sheetId/proofs/:number', loader: sheetLoader(queryClient), lazy: () => import('./pages/guest/proof-page.tsx') },
];

/** A studio's pages without its navigation: they look as the guest's do. */
const previewPages: RouteObject[] = [
  { path: 'commissions/:commissionId/proofs/:sheetId/preview', lazy: () => import('./pages/studio/sheet-preview-page.tsx') },
];

/** Every part of the pages at once, while building. */
const developmentPages: RouteObject[] = import.meta.env.DEV
  ? [{ path: 'gallery', lazy: () => import('./pages/development/gallery-page.tsx') }]
  : [];

/** The site map. Every page is loaded when it is first visited. */
export const router = createBrowserRouter([
  {
    path: '/',
    element: <Root />,
    errorElement: <BrokenPage />,
    hydrateFallbackElement: <Pending />,
    children: [
      ...doorPages,
      ...guestPages,
      ...previewPages,
      ...developmentPages,
      { lazy: () => import('./pages/studio/studio-layout.tsx'), children: studioPages },
      { path: '*', element: <NotFoundPage /> },
    ],
  },
]);
