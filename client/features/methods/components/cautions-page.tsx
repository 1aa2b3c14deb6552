import { Notice } from '../../../components/ui/notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { CAUTIONS, type CautionPart } from '../caution-list.ts';
import { Contents } from './contents.tsx';

function Part({ part }: { part: CautionPart }) {
  return (
    <section aria-labelledby={part.id} className="mt-10 scroll-mt-4">
      <h2 id={part.id} className="mb-3 border-b border-rule pb-2">
        {part.title}
      </h2>
      <ul className="flex max-w-prose list-disc flex-col gap-3 pl-5">
        {part.items.map(({ text, source }) => (
          <li key={text}>
            {text}
            {source && <span className="block text-note text-ink-2">Source: {source}.</span>}
          </li>
        ))}
      </ul>
    </section>
  );
}

/** What can hurt, and what can be forbidden. */
export function CautionsPage() {
  return (
    <Page title="Cautions" sub="What can hurt, and what can be forbidden.">
      <Notice tone="attention" title="Check your local rules; this is not legal advice" className="mb-8">
        Laws and limits differ from place to place and change. What stands here is a pointer to ask further,
        from sources named line by line; “from memory” means that nobody has looked it up again.
      </Notice>
      <Contents parts={CAUTIONS} />
      {CAUTIONS.map((part) => (
        <Part key={part.id} part={part} />
      ))}
      <p className="mt-10 max-w-prose border-t border-rule pt-4 font-medium">
        Check your local rules; this is not legal, tax or safety advice.
      </p>
    </Page>
  );
}
