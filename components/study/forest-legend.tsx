/** What the marks of the interval glyph mean, for the margin. */
export function ForestLegend() {
  return (
    <dl className="kv legend">
      <dt>
        <svg width="40" height="14" aria-hidden="true">
          <path className="data" strokeDasharray="4 2.5" d="M2 7H38" />
          <circle cx="20" cy="7" r="4.6" className="fdata" />
        </svg>
      </dt>
      <dd>carried</dd>
      <dt>
        <svg width="40" height="14" aria-hidden="true">
          <path className="inkl" strokeWidth="2" strokeDasharray="4 2.5" d="M2 7H38" />
          <circle cx="20" cy="7" r="4.2" className="fpaper" stroke="var(--ink)" strokeWidth="1.5" />
        </svg>
      </dt>
      <dd>cannot tell, or does not</dd>
      <dt>
        <svg width="40" height="14" aria-hidden="true">
          <path className="nui" strokeDasharray="4 2.5" d="M2 7H38" />
          <circle cx="20" cy="7" r="4.4" className="fpaper" stroke="var(--ochre)" strokeWidth="1.6" />
          <path className="fnui" d="M20 2.6a4.4 4.4 0 0 0 0 8.8z" />
        </svg>
      </dt>
      <dd>a nuisance explains it</dd>
      <dt>
        <svg width="40" height="14" aria-hidden="true">
          <path className="inkl" strokeWidth="2" strokeDasharray="4 2.5" d="M2 7H38" />
          <path className="fink" d="M15 7l8.5 -5v10z" />
        </svg>
      </dt>
      <dd>worse than the mean</dd>
      <dt>
        <svg width="40" height="14" aria-hidden="true">
          <rect x="8" y="5" width="24" height="5" className="hnul" />
        </svg>
      </dt>
      <dd>95 % of shuffles</dd>
    </dl>
  );
}
