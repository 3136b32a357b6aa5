import { lazy, Suspense, type ComponentType } from 'react';
import { createBrowserRouter, Navigate } from 'react-router-dom';
import { Loading } from '../components/query-states';
import { Landing } from './landing';
import { RequireSignIn } from './require-sign-in';
import { Shell } from './shell';

/** Each page is a chunk of its own, read when somebody goes there. */
const page = (load: () => Promise<{ default: ComponentType }>) => {
  const Page = lazy(load);
  return (
    <Suspense fallback={<Loading what="the page" />}>
      <Page />
    </Suspense>
  );
};

export const router = createBrowserRouter([
  { path: '/sign-in', element: page(() => import('../features/sign-in/sign-in-page')) },
  { path: '/forgot', element: page(() => import('../features/sign-in/forgot-page')) },
  { path: '/link/:token', element: page(() => import('../features/sign-in/link-page')) },
  { path: '/wall', element: page(() => import('../features/board/wall-page')) },
  {
    element: (
      <RequireSignIn>
        <Shell />
      </RequireSignIn>
    ),
    children: [
      { path: '/', element: <Landing>{page(() => import('../features/board/board-page'))}</Landing> },
      { path: '/my-crew', element: page(() => import('../features/my-crew/my-crew-page')) },
      { path: '/lost-fixes', element: page(() => import('../features/lost-fixes/lost-fixes-page')) },
      { path: '/lost-fixes/:id', element: page(() => import('../features/lost-fixes/lost-fix-page')) },
      { path: '/notices', element: page(() => import('../features/notices/notices-page')) },
      { path: '/weekly', element: page(() => import('../features/weekly/weekly-page')) },
      { path: '/crews/:id/days/:date', element: page(() => import('../features/crew-day/crew-day-page')) },
      { path: '/crews', element: page(() => import('../features/crews/crews-page')) },
      { path: '/sites', element: page(() => import('../features/sites/sites-page')) },
      {
        path: '/control-points',
        element: page(() => import('../features/control-points/control-points-page')),
      },
      { path: '/imports/:kind', element: page(() => import('../features/imports/imports-page')) },
      { path: '/rovers', element: page(() => import('../features/rovers/rovers-page')) },
      { path: '/check-shots', element: page(() => import('../features/check-shots/check-shots-page')) },
      { path: '/rovers/:id/set-up', element: page(() => import('../features/set-up/set-up-page')) },
      { path: '/rovers/:id/check-shot', element: page(() => import('../features/set-up/check-shot-page')) },
      { path: '/rovers/:id', element: page(() => import('../features/rovers/rover-page')) },
      { path: '/corrections', element: page(() => import('../features/corrections/corrections-page')) },
      { path: '/corrections/:id', element: page(() => import('../features/corrections/source-page')) },
      {
        path: '/corrections/:id/mount-points',
        element: page(() => import('../features/corrections/mount-points-page')),
      },
      { path: '/logs', element: page(() => import('../features/logs/logs-page')) },
      { path: '/logs/:id', element: page(() => import('../features/logs/log-page')) },
      {
        path: '/sentence-reader',
        element: page(() => import('../features/sentence-reader/sentence-reader-page')),
      },
      { path: '/users', element: page(() => import('../features/users/users-page')) },
      { path: '/settings', element: page(() => import('../features/settings/settings-page')) },
    ],
  },
  { path: '*', element: <Navigate to="/" replace /> },
]);
