import { Link } from 'react-router-dom';
import { paths } from '../lib/paths.ts';
import { isRouted } from './routes.tsx';

const links = [
  { to: paths.worth(), name: 'What is it worth?' },
  { to: paths.methods(), name: 'Methods and sources' },
  { to: paths.quotes(), name: 'Quotes' },
  { to: paths.cautions(), name: 'Cautions' },
];

export function SiteFooter() {
  const working = links.filter((link) => isRouted(link.to));
  return (
    <footer className="no-print border-t border-rule py-6 text-note text-ink-2">
      <div className="wrap flex flex-wrap items-start justify-between gap-x-10 gap-y-4">
        <p className="max-w-prose">
          Acids, fumes and some residues can injure or kill; gold and scrap are regulated goods in most
          places. Check your local rules: nothing here is legal, tax or safety advice.
        </p>
        {working.length > 0 && (
          <nav aria-label="Reference">
            <ul className="flex flex-wrap gap-x-5 gap-y-1">
              {working.map((link) => (
                <li key={link.to}>
                  <Link to={link.to} className="link inline-block py-1">
                    {link.name}
                  </Link>
                </li>
              ))}
            </ul>
          </nav>
        )}
      </div>
    </footer>
  );
}
