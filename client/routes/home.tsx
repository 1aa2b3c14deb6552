import { isRouted } from '../app/routes.tsx';
import { SpecimenDrawing } from '../components/figures/specimen-drawing.tsx';
import { LinkButton } from '../components/ui/button.tsx';
import { Page } from '../components/ui/page.tsx';
import { paths } from '../lib/paths.ts';

const steps = [
  {
    title: 'The figure is shown in full',
    text: 'Gross mass, fineness and the quote make the melt value, line by line, with the range it can lie in. Every line opens to its working, and a printed sheet can be added up by hand.',
  },
  {
    title: 'The word behind it is named',
    text: 'A certificate is compared with the entry and confirmed with its laboratory by the assay desk. The ticket says what was done and what was not.',
  },
  {
    title: 'The money waits for the scales',
    text: 'The buyer pays into escrow, the parcel travels insured, the buyer weighs and checks what arrives. Then the seller is paid, and both hold the same final sheet.',
  },
];

export function Component() {
  return (
    <Page title="Metal changes hands at its assay" className="pt-2">
      <div className="grid items-center gap-8 md:grid-cols-[minmax(0,1fr)_20rem]">
        <div>
          <p className="max-w-prose text-lead">
            Scruple is a register of recovered precious metal: buttons, bars and grain from small refiners,
            each with its mass, its fineness and how sure both are. What a lot is worth follows from these and
            the quote.
          </p>
          <div className="mt-6 flex flex-wrap gap-3">
            {isRouted(paths.register()) && (
              <LinkButton to={paths.register()}>Open the register of lots</LinkButton>
            )}
            {isRouted(paths.worth()) && (
              <LinkButton look="second" to={paths.worth()}>
                What is it worth?
              </LinkButton>
            )}
          </div>
        </div>
        <SpecimenDrawing form="button" metal="Au" className="mx-auto w-full max-w-80" />
      </div>
      <ol className="mt-10 grid gap-x-10 gap-y-6 border-t border-ink pt-6 md:grid-cols-3">
        {steps.map((step) => (
          <li key={step.title}>
            <h2 className="text-lead">{step.title}</h2>
            <p className="mt-1 text-ink-2">{step.text}</p>
          </li>
        ))}
      </ol>
    </Page>
  );
}
