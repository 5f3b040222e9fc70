import type uPlot from 'uplot';
import type { AxisTicks } from '@/components/charts/axis-ticks';
import { chartNumber } from '@/components/charts/chart-number';

/** Mean of the predictions at one level of the label, and their spread. */
export interface ScatterLevel {
  level: number;
  mean: number;
  sd: number | null;
}

export interface ScatterDrawing {
  xTicks: AxisTicks;
  yTicks: AxisTicks;
  xTitle: string;
  yTitle: string;
  levels: readonly ScatterLevel[];
  /** Ends of the identity line. */
  identity: readonly [number, number];
  /** The training means' average: what a readout without information predicts. */
  guess: number | null;
}

function variable(style: CSSStyleDeclaration, name: string): string {
  return style.getPropertyValue(name).trim();
}

/** Draws the single trials; those of the chosen range in ink, so that they stand out without a colour alone. */
export function paintDots(
  plot: uPlot,
  trials: readonly { trial: number; predicted: number }[],
  xs: readonly number[],
  chosen: readonly [number, number] | null,
): void {
  const { ctx } = plot;
  const style = getComputedStyle(plot.root);
  const opacity = Math.min(1, 0.42 * (Number(variable(style, '--dot')) || 1));
  const ratio = devicePixelRatio;
  const draw = (isChosen: boolean): void => {
    ctx.fillStyle = variable(style, isChosen ? '--ink' : '--verdigris');
    ctx.globalAlpha = isChosen ? 1 : opacity;
    const radius = (isChosen ? 2.2 : 1.6) * ratio;
    trials.forEach(({ trial, predicted }, index) => {
      if (isChosen !== (chosen !== null && trial >= chosen[0] && trial <= chosen[1])) return;
      ctx.beginPath();
      ctx.arc(
        plot.valToPos(xs[index], 'x', true),
        plot.valToPos(predicted, 'y', true),
        radius,
        0,
        2 * Math.PI,
      );
      ctx.fill();
    });
  };
  ctx.save();
  draw(false);
  if (chosen) draw(true);
  ctx.restore();
}

/** Draws what stands around the dots: range-frame axes, identity line, guess, means with ±1 SD brackets. */
export function paintScatter(plot: uPlot, drawing: ScatterDrawing): void {
  const { ctx } = plot;
  const ratio = devicePixelRatio;
  const style = getComputedStyle(plot.root);
  const text = variable(style, '--text');
  const mono = variable(style, '--mono');
  const x = (value: number): number => plot.valToPos(value, 'x', true);
  const y = (value: number): number => plot.valToPos(value, 'y', true);
  const stroke = (
    colour: string,
    width: number,
    lines: [number, number, number, number][],
    dash: number[] = [],
  ): void => {
    ctx.strokeStyle = colour;
    ctx.lineWidth = width * ratio;
    ctx.setLineDash(dash.map((length) => length * ratio));
    ctx.beginPath();
    for (const [x1, y1, x2, y2] of lines) {
      ctx.moveTo(x1, y1);
      ctx.lineTo(x2, y2);
    }
    ctx.stroke();
    ctx.setLineDash([]);
  };
  const write = (
    words: string,
    atX: number,
    atY: number,
    align: CanvasTextAlign,
    colour: string,
    font: string,
  ): void => {
    ctx.fillStyle = colour;
    ctx.font = font;
    ctx.textAlign = align;
    ctx.textBaseline = 'alphabetic';
    ctx.fillText(words, atX, atY);
  };
  const { left, top, width, height } = plot.bbox;
  const [edge, rule, ink, ink2, ink3] = ['--edge', '--rule', '--ink', '--ink-2', '--ink-3'].map((name) =>
    variable(style, name),
  );
  const tickFont = `${11 * ratio}px ${mono}`;
  const titleFont = `${12.5 * ratio}px ${text}`;
  const xs = drawing.xTicks.values;
  const ys = drawing.yTicks.values;
  const baseline = top + height + 6 * ratio;
  const side = left - 6 * ratio;

  ctx.save();
  stroke(edge, 1, [
    [x(xs[0]), baseline, x(xs[xs.length - 1]), baseline],
    ...xs.map((t): [number, number, number, number] => [x(t), baseline, x(t), baseline + 4 * ratio]),
  ]);
  stroke(edge, 1, [
    [side, y(ys[0]), side, y(ys[ys.length - 1])],
    ...ys.map((t): [number, number, number, number] => [side - 4 * ratio, y(t), side, y(t)]),
  ]);
  for (const t of xs)
    write(chartNumber(t, drawing.xTicks.decimals), x(t), baseline + 16 * ratio, 'center', ink3, tickFont);
  for (const t of ys)
    write(
      chartNumber(t, drawing.yTicks.decimals),
      side - 7 * ratio,
      y(t) + 3.8 * ratio,
      'right',
      ink3,
      tickFont,
    );
  write(drawing.xTitle, left + width / 2, baseline + 34 * ratio, 'center', ink2, titleFont);
  write(drawing.yTitle, 0, 11 * ratio, 'left', ink2, titleFont);
  if (drawing.guess !== null) stroke(rule, 1, [[left, y(drawing.guess), left + width, y(drawing.guess)]]);
  const [low, high] = drawing.identity;
  ctx.lineCap = 'round';
  stroke(ink, 1, [[x(low), y(low), x(high), y(high)]], [1, 3]);
  ctx.lineCap = 'butt';
  write('identity', x(high) - 4 * ratio, y(high) - 8 * ratio, 'right', ink, `${12 * ratio}px ${text}`);
  const spread =
    drawing.levels.length > 1 ? Math.abs(x(drawing.levels[1].level) - x(drawing.levels[0].level)) : width;
  const half = Math.min(20 * ratio, spread * 0.36);
  for (const { level, mean, sd } of drawing.levels) {
    stroke(ink, 3.2, [[x(level) - half, y(mean), x(level) + half, y(mean)]]);
    if (sd === null) continue;
    const [a, b, c] = [
      x(level) + half - 2 * ratio,
      x(level) + half + 3 * ratio,
      [y(mean + sd), y(mean - sd)],
    ];
    stroke(ink, 1.1, [
      [a, c[0], b, c[0]],
      [b, c[0], b, c[1]],
      [a, c[1], b, c[1]],
    ]);
  }
  ctx.restore();
}
