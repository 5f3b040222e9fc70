/** The hatchings that the sheet's classes refer to: `hm` the null, `hg` purge gaps, `ho` nuisance. Once a page, so it stands in the layout. */
export function Patterns() {
  return (
    <svg className="patterns" width="0" height="0" aria-hidden="true" focusable="false">
      <defs>
        <pattern id="hm" width="4" height="4" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <path d="M0 0v4" stroke="var(--madder)" strokeWidth="2.2" />
        </pattern>
        <pattern id="hg" width="4" height="4" patternUnits="userSpaceOnUse" patternTransform="rotate(-45)">
          <path d="M0 0v4" stroke="var(--ink-3)" strokeWidth="1.4" />
        </pattern>
        <pattern id="ho" width="4" height="4" patternUnits="userSpaceOnUse">
          <path d="M0 2h4" stroke="var(--ochre)" strokeWidth="1.8" />
        </pattern>
      </defs>
    </svg>
  );
}
