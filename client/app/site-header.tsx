import { Link, NavLink } from 'react-router-dom';
import type { MemberAnswer } from '#shared/schemas/session.ts';
import { cx } from '../lib/cx.ts';
import { paths } from '../lib/paths.ts';
import { AccountMenu } from './account-menu.tsx';
import { HeaderQuote } from './header-quote.tsx';
import { Mark } from './mark.tsx';
import { isRouted } from './routes.tsx';
import { ThemeSwitch } from './theme-switch.tsx';

type Room = { to: string; name: string; isOpenTo: (member: MemberAnswer | null) => boolean };

const everyone = () => true;
const rooms: Room[] = [
  { to: paths.register(), name: 'Market', isOpenTo: everyone },
  { to: paths.sell(), name: 'Sell', isOpenTo: (member) => member !== null },
  { to: paths.deals(), name: 'Deals', isOpenTo: (member) => member !== null },
  { to: paths.desk(), name: 'Desk', isOpenTo: (member) => member?.can.useDesk ?? false },
  { to: paths.worth(), name: 'What is it worth?', isOpenTo: everyone },
  { to: paths.methods(), name: 'Methods', isOpenTo: everyone },
];

type SiteHeaderProps = { member: MemberAnswer | null };

export function SiteHeader({ member }: SiteHeaderProps) {
  const open = rooms.filter((room) => isRouted(room.to) && room.isOpenTo(member));
  return (
    <header className="no-print border-b border-rule">
      <div className="wrap flex flex-wrap items-center gap-x-7 md:min-h-15">
        <Link
          to={paths.home()}
          className="flex items-center gap-2 py-3 text-[1.1875rem] font-semibold tracking-tight"
        >
          <Mark className="size-6" />
          Scruple
        </Link>
        {open.length > 0 && (
          <nav aria-label="Rooms" className="order-last w-full md:order-none md:w-auto">
            <ul className="flex flex-wrap gap-x-5">
              {open.map((room) => (
                <li key={room.to}>
                  <NavLink to={room.to} className={roomClass}>
                    {room.name}
                  </NavLink>
                </li>
              ))}
            </ul>
          </nav>
        )}
        <div className="ml-auto flex items-center gap-x-3 sm:gap-x-5">
          <HeaderQuote />
          <ThemeSwitch />
          <AccountMenu member={member} />
        </div>
      </div>
    </header>
  );
}

function roomClass({ isActive }: { isActive: boolean }): string {
  return cx(
    'block border-b-2 pb-2 pt-1.5 md:pb-4 md:pt-[1.125rem]',
    isActive ? 'border-ink text-ink' : 'border-transparent text-ink-2 hover:text-ink',
  );
}
