const shapes = 8;

/** The category mark of the n-th animal of a study: colour and shape together, in the order of the study's animals. */
export function AnimalShape({ index }: { index: number }) {
  const category = index % shapes;
  const colour = `var(--c${category + 1})`;
  const line = { fill: 'none', stroke: colour, strokeWidth: 2 };
  return (
    <svg className="animal-shape" width="14" height="12" aria-hidden="true">
      {category === 0 ? <circle cx="6" cy="6" r="4.6" fill={colour} /> : null}
      {category === 1 ? <rect x="2" y="2" width="8.2" height="8.2" fill={colour} /> : null}
      {category === 2 ? <path d="M6 .5l5 9.2h-10z" fill={colour} /> : null}
      {category === 3 ? <path d="M6 0l5.4 6l-5.4 6l-5.4 -6z" fill={colour} /> : null}
      {category === 4 ? <path d="M1 6h10M6 1v10" {...line} /> : null}
      {category === 5 ? <path d="M6 11.5l5 -9.2h-10z" fill={colour} /> : null}
      {category === 6 ? <rect x="4" y="0" width="4" height="12" fill={colour} /> : null}
      {category === 7 ? <circle cx="6" cy="6" r="4.2" {...line} /> : null}
    </svg>
  );
}
