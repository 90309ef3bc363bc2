/** The mark: nine pins of a loom, one thread between them. */
export function Brand() {
  const pins = [4, 12, 20];
  return (
    <span className="inline-flex items-center gap-2 text-xl font-semibold tracking-tight text-ink">
      Pinloom
      <svg viewBox="0 0 24 24" className="size-6" aria-hidden="true">
        <path d="M4 4h8v8h8v8" fill="none" stroke="var(--weld)" strokeWidth="2" />
        {pins.flatMap((x) =>
          pins.map((y) => <circle key={`${x}-${y}`} cx={x} cy={y} r="2" fill="var(--indigo)" />),
        )}
      </svg>
    </span>
  );
}
