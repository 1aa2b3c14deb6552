import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import { Link, useLocation, useNavigate } from 'react-router-dom';
import type { MemberAnswer } from '#shared/schemas/session.ts';
import { apiSend, rememberCsrfToken } from '../lib/api-client.ts';
import { paths } from '../lib/paths.ts';
import { isRouted } from './routes.tsx';

type AccountMenuProps = { member: MemberAnswer | null };

export function AccountMenu({ member }: AccountMenuProps) {
  if (member) return <MemberMenu member={member} />;
  if (!isRouted(paths.signIn())) return null;
  return (
    <Link to={paths.signIn()} className="rounded-box px-1 py-1.5 font-medium text-ink hover:underline">
      Sign in
    </Link>
  );
}

/** Everything private leaves the cache with the member. */
function useSignOut() {
  const client = useQueryClient();
  const navigate = useNavigate();
  return useMutation({
    mutationFn: () => apiSend('/api/v1/session', { method: 'DELETE' }),
    onSuccess: async () => {
      rememberCsrfToken(null);
      await navigate(paths.home());
      await client.resetQueries();
    },
  });
}

function MemberMenu({ member }: { member: MemberAnswer }) {
  const [isOpen, setIsOpen] = useState(false);
  const root = useRef<HTMLDivElement>(null);
  const toggle = useRef<HTMLButtonElement>(null);
  const signOut = useSignOut();
  const { key } = useLocation();
  useEffect(() => setIsOpen(false), [key]);
  useEffect(() => {
    if (!isOpen) return;
    const close = (event: Event) => {
      if (event instanceof KeyboardEvent) {
        if (event.key !== 'Escape') return;
        toggle.current?.focus();
      } else if (root.current?.contains(event.target as Node)) return;
      setIsOpen(false);
    };
    document.addEventListener('keydown', close);
    document.addEventListener('pointerdown', close);
    document.addEventListener('focusin', close);
    return () => {
      document.removeEventListener('keydown', close);
      document.removeEventListener('pointerdown', close);
      document.removeEventListener('focusin', close);
    };
  }, [isOpen]);
  const item = 'block w-full rounded-box px-3 py-2 text-left hover:bg-wash';
  return (
    <div ref={root} className="relative">
      <button
        ref={toggle}
        type="button"
        aria-expanded={isOpen}
        aria-controls="account-links"
        onClick={() => setIsOpen(!isOpen)}
        className="flex min-h-8 items-center gap-1.5 rounded-box px-1 font-medium"
      >
        <span className="max-w-28 truncate">{member.displayName}</span>
        <svg
          viewBox="0 0 10 6"
          className="w-2.5"
          fill="none"
          stroke="currentColor"
          strokeWidth="1.5"
          aria-hidden="true"
        >
          <path d="m1 1 4 4 4-4" />
        </svg>
      </button>
      {isOpen && (
        <div
          id="account-links"
          className="absolute right-0 top-full z-30 mt-1 w-56 rounded-box border border-line bg-sheet p-1 shadow-float"
        >
          {isRouted(paths.account()) && (
            <Link to={paths.account()} className={item}>
              Account
            </Link>
          )}
          {isRouted(paths.sell()) && (
            <Link to={paths.sell()} className={item}>
              Lots you sell
            </Link>
          )}
          <button
            type="button"
            className={item}
            disabled={signOut.isPending}
            onClick={() => signOut.mutate()}
          >
            Sign out
          </button>
          {signOut.isError && (
            <p role="alert" className="px-3 py-2 text-note text-litharge">
              You are still signed in: {signOut.error.message}
            </p>
          )}
        </div>
      )}
    </div>
  );
}
