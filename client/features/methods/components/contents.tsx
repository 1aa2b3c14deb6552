type ContentsProps = { parts: readonly { id: string; title: string }[] };

/** The parts of a long page. */
export function Contents({ parts }: ContentsProps) {
  return (
    <nav aria-label="On this page" className="no-print">
      <ul className="flex flex-wrap gap-x-6 gap-y-1">
        {parts.map(({ id, title }) => (
          <li key={id}>
            <a href={`#${id}`} className="link inline-block py-1">
              {title}
            </a>
          </li>
        ))}
      </ul>
    </nav>
  );
}
