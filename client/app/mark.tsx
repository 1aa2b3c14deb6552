type MarkProps = { className?: string };

/** Our sign, the apothecary's scruple: two bows opening to the left, joined by the short middle bar. */
export function Mark({ className }: MarkProps) {
  return (
    <svg
      viewBox="0 0 24 24"
      fill="none"
      stroke="currentColor"
      strokeLinecap="round"
      aria-hidden="true"
      className={className}
    >
      <path
        strokeWidth="2.3"
        d="M6.2 6.1C8.4 4 15.8 3.4 16.8 7.1c.8 3-2.6 4.7-6 4.9 4.3-.1 7.5 1.6 7.3 4.8-.3 4.3-8.4 5.1-12.3 2.1"
      />
      <path strokeWidth="1.8" d="M5.4 12h5.4" />
    </svg>
  );
}
