import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useRef } from 'react';
import { Outlet, ScrollRestoration, useLocation, useNavigation } from 'react-router-dom';
import { Toaster } from '../components/ui/toaster.tsx';
import { ReaderContext, visitorReader } from '../lib/reader-context.ts';
import { sessionQuery } from '../lib/session.ts';
import { SiteFooter } from './site-footer.tsx';
import { SiteHeader } from './site-header.tsx';

/** After a change of page the reader of a screen reader starts at the new heading, as a full page load would. */
function useFocusOnNewPage() {
  const { pathname } = useLocation();
  const shownPath = useRef(pathname);
  const main = useRef<HTMLElement>(null);
  useEffect(() => {
    if (shownPath.current === pathname) return;
    shownPath.current = pathname;
    const hasOwnFocus = main.current?.contains(document.activeElement);
    const heading = main.current?.querySelector<HTMLElement>('h1');
    if (!hasOwnFocus) (heading ?? main.current)?.focus({ preventScroll: true });
  }, [pathname]);
  return main;
}

export function RootLayout() {
  const { data: session } = useQuery(sessionQuery);
  const member = session?.member ?? null;
  const isLoading = useNavigation().state === 'loading';
  const main = useFocusOnNewPage();
  const reader = useMemo(
    () => (member ? { timeZone: member.timeZone, weightUnit: member.weightUnit } : visitorReader),
    [member],
  );
  return (
    <ReaderContext value={reader}>
      <a
        href="#main"
        className="sr-only rounded-box bg-verdigris font-semibold text-sheet focus:not-sr-only focus:fixed focus:left-3 focus:top-2 focus:z-50 focus:px-4 focus:py-2"
      >
        Skip to the page
      </a>
      <SiteHeader member={member} />
      {isLoading && (
        <div className="late no-print fixed inset-x-0 top-0 z-40 h-0.5 overflow-hidden" aria-hidden="true">
          <div className="h-full w-1/3 animate-[sweep_1.2s_linear_infinite] bg-verdigris" />
        </div>
      )}
      <main id="main" ref={main} tabIndex={-1} aria-busy={isLoading} className="wrap grow pb-16 pt-8">
        <Outlet />
      </main>
      <SiteFooter />
      <Toaster />
      <ScrollRestoration />
    </ReaderContext>
  );
}
