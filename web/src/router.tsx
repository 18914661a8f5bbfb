import { createBrowserRouter, Navigate, type RouteObject } from 'react-router-dom';
import { sheetLoader } from './features/sheets-guest/queries.ts';
import { queryClient } from './lib/query-client.ts';
import { BrokenPage } from './pages/broken-page.tsx';
import { NotFoundPage } from './pages/not-found-page.tsx';
import { Root } from './pages/root.tsx';
import { Pending } from './ui/pending.tsx';

/** Without a session: signing in and up, resetting, joining a studio. */
const doorPages: RouteObject[] = [
  { index: true, element: <Navigate to="/desk" replace /> },
  { path: 'sign-in', lazy: () => import('./pages/sign-in-page.tsx') },
  { path: 'sign-up', lazy: () => import('./pages/sign-up-page.tsx') },
  { path: 'reset-password', lazy: () => import('./pages/reset-password-page.tsx') },
  { path: 'reset-password/:token', lazy: () => import('./pages/reset-password-link-page.tsx') },
  { path: 'confirm-email/:token', lazy: () => import('./pages/confirm-email-page.tsx') },
  { path: 'join/:token', lazy: () => import('./pages/join-page.tsx') },
];

/** The studio's pages, inside the shell with the navigation at the left. */
const studioPages: RouteObject[] = [
  { path: 'desk', lazy: () => import('./pages/studio/desk-page.tsx') },
  { path: 'commissions', lazy: () => import('./pages/studio/commissions-page.tsx') },
  { path: 'commissions/new', lazy: () => import('./pages/studio/commissions-new-page.tsx') },
  { path: 'clients', lazy: () => import('./pages/studio/clients-page.tsx') },
  { path: 'clients/:clientId', lazy: () => import('./pages/studio/client-page.tsx') },
  {
    path: 'settings',
    lazy: () => import('./pages/studio/settings/settings-layout.tsx'),
    children: [
      { index: true, element: <Navigate to="/settings/studio" replace /> },
      { path: 'studio', lazy: () => import('./pages/studio/settings/studio-page.tsx') },
      { path: 'account', lazy: () => import('./pages/studio/settings/account-page.tsx') },
      { path: 'team', lazy: () => import('./pages/studio/settings/team-page.tsx') },
      { path: 'watermark', lazy: () => import('./pages/studio/settings/watermark-page.tsx') },
      { path: 'checks', lazy: () => import('./pages/studio/settings/checks-page.tsx') },
      { path: 'uses', lazy: () => import('./pages/studio/settings/uses-page.tsx') },
      { path: 'mail', lazy: () => import('./pages/studio/settings/mail-page.tsx') },
      { path: 'storage', lazy: () => import('./pages/studio/settings/storage-page.tsx') },
    ],
  },
  {
    path: 'commissions/:commissionId',
    lazy: () => import('./pages/studio/commission/layout.tsx'),
    children: [
      { index: true, element: <Navigate to="brief" replace /> },
      { path: 'brief', lazy: () => import('./pages/studio/commission/brief-page.tsx') },
      {
        path: 'frames',
        lazy: () => import('./pages/studio/commission/frames-page.tsx'),
        children: [{ path: ':frameId', lazy: () => import('./pages/studio/commission/frames-viewer-page.tsx') }],
      },
      { path: 'proofs', lazy: () => import('./pages/studio/commission/proofs-page.tsx') },
      { path: 'proofs/:sheetId', lazy: () => import('./pages/studio/commission/proofs-page.tsx') },
      { path: 'picks', lazy: () => import('./pages/studio/commission/picks-page.tsx') },
      { path: 'finals', lazy: () => import('./pages/studio/commission/finals-page.tsx') },
      { path: 'delivery', lazy: () => import('./pages/studio/commission/delivery-page.tsx') },
      { path: 'record', lazy: () => import('./pages/studio/commission/record-page.tsx') },
    ],
  },
];

/** The guests' pages: sheets, deliveries and what they were ever invited to. */
const guestPages: RouteObject[] = [
  { path: 'open/:token', lazy: () => import('./pages/guest/open-page.tsx') },
  { path: 'look/:token', lazy: () => import('./pages/guest/look-page.tsx') },
  { path: 'begin/:token', lazy: () => import('./pages/guest/begin-page.tsx') },
  { path: 'deliveries/:deliveryId', lazy: () => import('./pages/guest/delivery-page.tsx') },
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
