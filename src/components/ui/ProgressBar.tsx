interface Props {
  /** What makes progress. */
  readonly label: string;
  /** Done so far, [0, 1]; null when nobody can say. */
  readonly fraction: number | null;
}

const PER_CENT = 100;

/** True progress as a thin ink bar; without a fraction an empty track, for a made-up motion would be a lie. */
export function ProgressBar({ label, fraction }: Props) {
  const percent = fraction === null ? null : Math.round(fraction * PER_CENT);
  return (
    <div
      role="progressbar"
      aria-label={label}
      aria-valuemin={0}
      aria-valuemax={PER_CENT}
      {...(percent === null ? {} : { 'aria-valuenow': percent })}
      className="h-1 w-full bg-line"
    >
      <div className="h-full bg-ink" style={{ width: `${String(percent ?? 0)}%` }} />
    </div>
  );
}
