type LogoProps = { size?: number; withName?: boolean };

/** The mark: two axes, a load line, and the Q-point in its middle. */
export function Logo({ size = 22, withName = true }: LogoProps) {
  return (
    <span className="inline-flex items-center gap-2.5 text-ink">
      <svg
        viewBox="0 0 22 22"
        width={size}
        height={size}
        fill="none"
        role={withName ? undefined : "img"}
        aria-label={withName ? undefined : "Evenswing"}
        aria-hidden={withName ? true : undefined}
      >
        <path d="M2.5 2v17.5H20" className="stroke-cutoff" strokeWidth="1.25" />
        <path d="M2.5 2.5L19.5 18" stroke="currentColor" strokeWidth="2" strokeLinecap="round" />
        <circle cx="11" cy="10.25" r="3.5" className="fill-ember" />
      </svg>
      {withName && <span className="font-semibold text-lg tracking-tight">Evenswing</span>}
    </span>
  );
}
