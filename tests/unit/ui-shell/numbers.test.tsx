import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { numbers } from '@/components/ui/numbers';
import { splitNumbers } from '@/lib/format/split-numbers';

const inMono = (text: string) =>
  splitNumbers(text)
    .filter((piece) => piece.isNumber)
    .map((piece) => piece.text);

describe('numbers inside sentences', () => {
  it('sets figures in mono and leaves R², P1 and names in the text face', () => {
    expect(inMono('Held-out R² is 0.45 in P1 of MT2, units 12 of 60')).toEqual(['0.45', '12', '60']);
  });
  it('keeps an estimate and its interval on one line', () => {
    expect(inMono('held-out R² is −0.05 [−0.10, −0.01].')).toEqual(['−0.05\u00a0[−0.10,\u00a0−0.01]']);
  });
  it('keeps a symbol with its number', () => {
    expect(inMono('no more (p = 0.001), as said')).toEqual(['p\u00a0=\u00a00.001']);
    expect(splitNumbers('in trial 7 of').map((piece) => piece.text)).toEqual(['in trial\u00a0', '7', ' of']);
  });
  it('gives negative numbers a real minus sign and leaves ranges alone', () => {
    expect(inMono('r = -0.25 from -100 to 200, trials 402-438')).toEqual([
      'r\u00a0=\u00a0−0.25',
      '−100',
      '200',
      '402',
      '438',
    ]);
    expect(inMono('(r² = 0.935)')).toEqual(['r²\u00a0=\u00a00.935']);
  });
  it('ties thousands and clock times', () => {
    expect(inMono('1 000 shuffles at 18:24, 95 % of them')).toEqual(['1\u00a0000', '18:24', '95']);
  });
  it('always sets Greek letters in mono, where the shipped subset has them', () => {
    expect(inMono('Spearman ρ and τ² and λ')).toEqual(['ρ', 'τ²', 'λ']);
  });
  it('loses no character besides turning spaces into no-break ones', () => {
    const text = 'From 80 to 480 ms: R² 0.45 [0.40, 0.50], p = 0.001, 1 000 of λ, v0.9.2, a/3, #12.';
    expect(
      splitNumbers(text)
        .map((piece) => piece.text)
        .join('')
        .replaceAll('\u00a0', ' '),
    ).toBe(text);
  });
  it('looks into plain elements, and leaves code and settled numbers alone', () => {
    expect(
      renderToStaticMarkup(
        <p>
          {numbers(
            <>
              <b>7 of 9</b> <code>v2</code> <span className="n">3</span>
            </>,
          )}
        </p>,
      ),
    ).toBe(
      '<p><b><span class="n">7</span> of <span class="n">9</span></b> <code>v2</code> <span class="n">3</span></p>',
    );
  });
});
