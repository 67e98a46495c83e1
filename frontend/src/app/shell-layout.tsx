import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import { Link, NavLink, Outlet, ScrollRestoration, useLocation, useNavigation } from 'react-router-dom';
import { apiSend } from '../lib/api-client';
import { useSession } from '../lib/session';
import { navigationFor } from './navigation';
import { paths } from './paths';
import styles from './shell-layout.module.css';

/** Word mark, navigation, the page. Plain elements only: antd would triple what a first visit loads. */
export function ShellLayout() {
  const session = useSession();
  const location = useLocation();
  const pending = useNavigation().state !== 'idle';
  // Open on the page it was opened on: going elsewhere closes it.
  const [menuOpenedOn, setMenuOpenedOn] = useState<string | null>(null);
  const menuOpen = menuOpenedOn === location.pathname;
  const main = useRef<HTMLElement>(null);
  const lastPath = useRef(location.pathname);
  const signOut = useSignOut();

  useEffect(() => {
    if (lastPath.current === location.pathname) return;
    lastPath.current = location.pathname;
    // A new page is announced from its beginning, as a load of the document would be.
    main.current?.focus();
  }, [location.pathname]);

  return (
    <div className={styles.shell}>
      <a className={styles.skip} href="#page">
        Skip to the page
      </a>
      <header className={styles.header}>
        <Link to={paths.home.pattern} className={styles.wordMark}>
          Stayledger
        </Link>
        <button
          type="button"
          className={styles.menuButton}
          aria-expanded={menuOpen}
          aria-controls="shell-menu"
          onClick={() => setMenuOpenedOn(menuOpen ? null : location.pathname)}
        >
          Menu
        </button>
        <div id="shell-menu" className={styles.menu} data-open={menuOpen}>
          <nav aria-label="Main" className={styles.nav}>
            {navigationFor(session).map((item) => {
              const within = item.also?.some((prefix) => location.pathname.startsWith(prefix));
              return (
                <NavLink
                  key={item.to}
                  to={item.to}
                  className={({ isActive }) => (isActive || within ? styles.current : undefined)}
                >
                  {item.label}
                </NavLink>
              );
            })}
          </nav>
          <div className={styles.person}>
            <NavLink
              to={paths.profile.pattern}
              className={({ isActive }) => (isActive ? styles.current : undefined)}
            >
              {session.user.name}
            </NavLink>
            <button
              type="button"
              className={styles.signOut}
              disabled={signOut.isPending}
              onClick={() => signOut.mutate()}
            >
              Sign out
            </button>
          </div>
        </div>
        <div className={styles.progress} data-on={pending} aria-hidden="true" />
      </header>
      {signOut.isError ? (
        <p role="alert" className={styles.notice}>
          {signOut.error.message}
        </p>
      ) : null}
      <main id="page" ref={main} tabIndex={-1} className={styles.main}>
        <Outlet />
      </main>
      <ScrollRestoration />
    </div>
  );
}

function useSignOut() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => apiSend('POST', '/auth/sign-out', null),
    onSuccess: () => {
      // Nothing of the person may stay behind for the next one at this browser, so the whole page is loaded anew.
      queryClient.clear();
      window.location.assign(paths.signIn.pattern);
    },
  });
}
