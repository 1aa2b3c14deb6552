/** Stands in the header once quotes can be read; see components/figures/quote-note.tsx for how it is said. */
export function HeaderQuote() {
  return null;
}
