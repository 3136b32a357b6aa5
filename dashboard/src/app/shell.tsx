import { lazy, Suspense } from 'react';
import { NavLink, Outlet, useLocation } from 'react-router-dom';
import { ErrorBoundary } from '../components/error-boundary';
import { Loading } from '../components/query-states';
import { LostFixCount } from '../live/lost-fix-count';
import { StreamState } from '../live/stream-state';
import { useMe } from '../lib/session';
import { FirmClock } from './firm-clock';
import { pagesFor } from './pages';
import { UserMenu } from './user-menu';
import './shell.css';

const NoticeBell = lazy(() => import('../features/notices/notice-bell'));

/** Header with the ways to go, and the page. */
export function Shell() {
  const me = useMe();
  const { pathname } = useLocation();
  return (
    <>
      <a className="skip-link" href="#main">
        Skip to the page
      </a>
      <header className="shell-header">
        <NavLink to="/" className="shell-mark" aria-label="Hubtack, to the board">
          <img src="/mark.svg" alt="" width="20" height="20" />
          <span>Hubtack</span>
        </NavLink>
        <nav className="shell-nav" aria-label="Pages">
          {pagesFor(me.role).map(({ path, name }) => (
            <NavLink key={path} to={path} end={path === '/'}>
              {name}
              {path === '/lost-fixes' && <LostFixCount />}
            </NavLink>
          ))}
        </nav>
        <div className="shell-state">
          <StreamState />
          <FirmClock />
          <Suspense fallback={null}>
            <NoticeBell />
          </Suspense>
          <UserMenu />
        </div>
      </header>
      <main id="main" className="shell-main" tabIndex={-1}>
        <ErrorBoundary resetKey={pathname}>
          <Suspense fallback={<Loading what="the page" />}>
            <Outlet />
          </Suspense>
        </ErrorBoundary>
      </main>
    </>
  );
}
