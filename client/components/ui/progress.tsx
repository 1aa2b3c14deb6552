type ProgressProps = { label: string; /** 0 to 1 */ share: number };

/** Long work under way, such as an upload. */
export function Progress({ label, share }: ProgressProps) {
  const percent = Math.floor(Math.min(1, Math.max(0, share)) * 100);
  return (
    <div>
      <div className="flex justify-between gap-4 text-note">
        <span className="min-w-0 truncate">{label}</span>
        <span className="fig text-ink-2">{percent} %</span>
      </div>
      <div
        role="progressbar"
        aria-label={label}
        aria-valuenow={percent}
        aria-valuemin={0}
        aria-valuemax={100}
        className="mt-1 h-2 rounded-box border border-line"
      >
        <div className="h-full bg-verdigris" style={{ width: `${percent}%` }} />
      </div>
    </div>
  );
}
