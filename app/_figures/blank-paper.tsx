/** A piece of empty chart paper with its two axes: there is a place for data, and none yet. */
export function BlankPaper({ width, height, step = 10 }: { width: number; height: number; step?: number }) {
  const lines = [
    ...Array.from({ length: Math.floor(width / step) }, (_, i) => `M${(i + 1) * step} 0V${height}`),
    ...Array.from({ length: Math.floor(height / step) }, (_, i) => `M0 ${i * step}H${width}`),
  ].join("");
  return (
    <svg
      viewBox={`-1 0 ${width + 1} ${height + 1}`}
      width={width}
      height={height}
      aria-hidden="true"
      className="chart block h-auto max-w-full"
    >
      <path className="minor" d={lines} fill="none" />
      <path className="axis" d={`M0 0V${height}H${width}`} />
    </svg>
  );
}
