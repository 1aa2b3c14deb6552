import { Page } from '../components/ui/page.tsx';

export function Component() {
  return (
    <Page title="Metal changes hands at its assay" className="pt-4">
      <p className="max-w-prose text-lead">
        Scruple is a register of recovered precious metal. A lot is a button, bar or parcel of grain with its
        mass, its fineness and how sure both are. What it is worth follows from those and the quote, line by
        line. The buyer pays into escrow, weighs and checks what arrives, and only then is the seller paid.
      </p>
    </Page>
  );
}
