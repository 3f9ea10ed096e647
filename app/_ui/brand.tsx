/** The brand's mark: a trace on its axes with the slope at zero. */
export function BrandMark() {
  return (
    <svg width="22" height="20" viewBox="0 0 22 20" aria-hidden="true">
      <path d="M1.2 19V1.2M.8 18.6H21" stroke="currentColor" strokeWidth="1.5" fill="none" />
      <path d="M2 18C5 9.6 9.8 6.4 20.5 5.4" stroke="currentColor" strokeWidth="1.7" fill="none" />
      <path d="M1.6 18.4 8.6 1.2" stroke="var(--mark-line)" strokeWidth="2.2" fill="none" />
    </svg>
  );
}
