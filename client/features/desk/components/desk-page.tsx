import type { ReactNode } from 'react';
import { NavLink } from 'react-router-dom';
import { Page } from '../../../components/ui/page.tsx';
import { cx } from '../../../lib/cx.ts';
import { paths } from '../../../lib/paths.ts';
import { useMember } from '../../../lib/session.ts';

type DeskPageProps = { title: string; heading?: ReactNode; sub?: ReactNode; children: ReactNode };

const adminRooms = [
  { to: paths.deskAudit(), name: 'Audit trail' },
  { to: paths.adminMails(), name: 'Mails' },
];

/** A page of the desk, with the ways to the others. */
export function DeskPage({ children, ...page }: DeskPageProps) {
  const member = useMember();
  const rooms = [
    { to: paths.desk(), name: 'Certificates' },
    { to: paths.deskDeals(), name: 'Contested deals' },
    { to: paths.deskLaboratories(), name: 'Laboratories' },
    { to: paths.deskMembers(), name: 'Members' },
    ...(member?.role === 'admin' ? adminRooms : []),
  ];
  return (
    <>
      <nav aria-label="Desk" className="no-print mb-6 border-b border-rule pb-1">
        <ul className="flex flex-wrap gap-x-5 gap-y-1">
          {rooms.map((room) => (
            <li key={room.to}>
              <NavLink
                to={room.to}
                end
                className={({ isActive }) =>
                  cx(
                    'inline-block py-1.5 underline-offset-4 hover:underline',
                    isActive ? 'font-semibold text-ink' : 'text-ink-2',
                  )
                }
              >
                {room.name}
              </NavLink>
            </li>
          ))}
        </ul>
      </nav>
      <Page {...page}>{children}</Page>
    </>
  );
}
