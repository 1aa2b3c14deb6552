import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { LinkButton } from '../../../components/ui/button.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { paths } from '../../../lib/paths.ts';
import { newestLotsQuery } from '../api/newest-lots-query.ts';
import { HowADealRuns } from './how-a-deal-runs.tsx';
import { NewestLots } from './newest-lots.tsx';
import { WorkedSheet } from './worked-sheet.tsx';

type HomePageProps = { isSignedIn: boolean };

/** What this is, in a line, and then shown. */
export function HomePage({ isSignedIn }: HomePageProps) {
  const lots = useQuery(newestLotsQuery);
  const shown = lots.data?.rows.find((row) => row.melt !== null)?.code ?? null;
  return (
    <Page title="Metal changes hands at its assay" className="pt-2">
      <div className="grid items-center gap-8 md:grid-cols-[minmax(0,1fr)_18rem]">
        <div>
          <p className="max-w-prose text-lead">
            Scruple is a register of recovered precious metal: buttons, bars and grain from small refiners,
            each with its mass, its fineness and how sure both are. The money waits in escrow until the buyer
            has put the lot on his own scale.
          </p>
          <div className="mt-6 flex flex-wrap gap-3">
            <LinkButton to={paths.register()}>Open the register of lots</LinkButton>
            <LinkButton look="second" to={paths.worth()}>
              What is it worth?
            </LinkButton>
            {!isSignedIn && (
              <LinkButton look="quiet" to={paths.signUp()}>
                Sign up
              </LinkButton>
            )}
          </div>
        </div>
        <SpecimenDrawing form="button" metal="Au" className="mx-auto hidden w-full max-w-72 md:block" />
      </div>
      <Part id="newest" title="Newest in the register">
        <NewestLots lots={lots} />
      </Part>
      <div className="grid gap-x-12 lg:grid-cols-2">
        <Part id="figure" title="The figure is shown in full">
          <p className="mb-4 max-w-prose text-ink-2">
            Gross mass, fineness and the quote make the melt value. Every line opens to its working, and a
            printed sheet can be added up by hand.{' '}
            <Link to={paths.methods()} className="link">
              Methods and sources
            </Link>
          </p>
          {lots.isPending ? null : <WorkedSheet code={shown} />}
        </Part>
        <div>
          <Part id="word" title="The word behind it is named">
            <p className="max-w-prose">
              A certificate is compared with the entry and confirmed with its laboratory by the assay desk,
              who says how, when and by whom. The ticket says what was done and what was not: the metal itself
              is not tested by Scruple.
            </p>
          </Part>
          <Part id="cautions" title="Before you touch it">
            <ul className="flex max-w-prose list-disc flex-col gap-2 pl-5">
              <li>Acids and their fumes can injure or kill; residues can stay acid for long.</li>
              <li>Some compounds of silver can become explosive.</li>
              <li>Tungsten has gold’s density: mass and volume alone prove nothing.</li>
              <li>Precious metal is a regulated good in most places, and not every carrier takes it.</li>
            </ul>
            <p className="mt-3 max-w-prose text-ink-2">
              Check your local rules; this is not legal advice.{' '}
              <Link to={paths.cautions()} className="link">
                All cautions
              </Link>
            </p>
          </Part>
        </div>
      </div>
      <Part id="run" title="How a deal runs">
        <HowADealRuns />
      </Part>
    </Page>
  );
}

function Part({ id, title, children }: { id: string; title: string; children: ReactNode }) {
  return (
    <section aria-labelledby={`home-${id}`} className="mt-12 min-w-0">
      <h2 id={`home-${id}`} className="mb-3">
        {title}
      </h2>
      {children}
    </section>
  );
}
