import { isNothing } from './deal-words.ts';
import { Quantity } from './quantity.tsx';

/** How much more or less was received than stated, in grams and in a word instead of a sign. */
export function MassDifference({ grams }: { grams: string }) {
  if (isNothing(grams)) return <>none</>;
  return (
    <>
      <Quantity value={grams.replace('-', '')} unit="g" /> {grams.startsWith('-') ? 'less' : 'more'}
    </>
  );
}
