/** Stands on every page that shows a study made for demonstration. */
export function InventedBanner() {
  return (
    <aside
      aria-label="About these data"
      className="border-b border-rule bg-desk px-8 py-1.5 text-caption text-ink-2 narrow:px-5 phone:px-4"
    >
      <b className="text-ink">Invented data.</b> This study was made for demonstration; its runs, traces and
      numbers come from a generator, not from a bench.
    </aside>
  );
}
