/** The mark: the stair of folds with one step pulled out. */
export function Mark({ size = 22 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 22 22" aria-hidden="true">
      <path d="M1 3h5M5 7.2h5M13 15.6h5M17 19.8h4" stroke="var(--ink)" strokeWidth="2.6" />
      <path d="M12 5.6h9" stroke="var(--verdigris)" strokeWidth="3.4" />
      <path d="M10.2 11.4h3.6" stroke="var(--edge)" strokeWidth="1.2" strokeDasharray="1.4 1.4" />
    </svg>
  );
}
