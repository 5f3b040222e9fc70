'use client';
import { Fragment, useId, useRef, useState, type ReactNode } from 'react';
import { canvasPng } from '@/components/charts/canvas-png';
import styles from '@/components/charts/figure.module.css';
import { FigureTable } from '@/components/charts/figure-table';
import { saveBlob } from '@/components/charts/save-blob';
import { svgDocument } from '@/components/charts/svg-document';
import { toCsv, type Cell, type FigureColumn } from '@/components/charts/to-csv';

export interface FigureProps {
  /** Short name of the picture, for the table's caption and the screen reader. */
  title: string;
  /** What is drawn, what was held out, what the interval covers and does not. */
  caption: ReactNode;
  columns: readonly FigureColumn[];
  rows: readonly (readonly Cell[])[];
  /** Name of the downloads, without extension. */
  fileName: string;
  children: ReactNode;
}

/** A picture with its caption, the table of the same numbers, and its downloads. */
export function Figure({ title, caption, columns, rows, fileName, children }: FigureProps) {
  const [open, setOpen] = useState(false);
  const plot = useRef<HTMLDivElement>(null);
  const tableId = useId();

  const savePicture = async (): Promise<void> => {
    const canvas = plot.current?.querySelector('canvas');
    const drawing = plot.current?.querySelector('svg');
    if (canvas) saveBlob(await canvasPng(canvas), `${fileName}.png`);
    else if (drawing)
      saveBlob(new Blob([svgDocument(drawing)], { type: 'image/svg+xml' }), `${fileName}.svg`);
  };
  const saveCsv = (): void =>
    saveBlob(new Blob([toCsv(columns, rows)], { type: 'text/csv;charset=utf-8' }), `${fileName}.csv`);

  const acts: [string, string, () => void][] = [
    [open ? 'Hide table' : 'Table', `table of ${title}`, () => setOpen(!open)],
    ['CSV', `CSV of ${title}`, saveCsv],
    ['Picture', `picture of ${title}`, () => void savePicture()],
  ];
  return (
    <figure>
      <div className={styles.plot} ref={plot}>
        {children}
      </div>
      <figcaption className="cap">
        {caption}{' '}
        <span className={`get ${styles.get}`}>
          {acts.map(([word, name, act], index) => (
            <Fragment key={name}>
              {index > 0 && ' · '}
              <button
                type="button"
                className={styles.act}
                onClick={act}
                {...(index === 0 ? { 'aria-expanded': open, 'aria-controls': tableId } : {})}
              >
                {word}
                <span className="vh">{index === 0 ? `: ${name}` : `, ${name}`}</span>
              </button>
            </Fragment>
          ))}
        </span>
      </figcaption>
      <div id={tableId}>{open && <FigureTable title={title} columns={columns} rows={rows} />}</div>
    </figure>
  );
}
