import type { Ctx } from '@/lib/services/context';
import { loadPredictions } from '@/lib/services/readouts/load-predictions';
import { predictionsCsv } from '@/lib/services/readouts/predictions-csv';
import { readPredictions } from '@/lib/services/readouts/predictions-table';

const arrowType = 'application/vnd.apache.arrow.stream';

/** All held-out predictions in the form that was asked for, CSV or Arrow; null where the caller takes JSON. */
export async function sendPredictions(
  ctx: Ctx,
  input: { readoutId: string; accept: string | null },
): Promise<Response | null> {
  const wanted = preferred(input.accept);
  if (wanted === null) return null;
  const { bytes, number } = await loadPredictions(ctx, input);
  const isCsv = wanted === 'text/csv';
  const body = isCsv ? predictionsCsv(readPredictions(bytes)) : new Uint8Array(bytes);
  const name = `readout-${number}-predictions.${isCsv ? 'csv' : 'arrow'}`;
  return new Response(body, {
    headers: {
      'content-type': isCsv ? 'text/csv; charset=utf-8; header=present' : arrowType,
      'content-disposition': `attachment; filename="${name}"`,
    },
  });
}

/** The most wanted of the forms that we have, by the q values of the Accept header; null for JSON. */
function preferred(accept: string | null): 'text/csv' | typeof arrowType | null {
  const offers = (accept ?? '').split(',').map((offer) => {
    const [type, ...parameters] = offer.split(';').map((part) => part.trim().toLowerCase());
    const q = parameters.find((parameter) => parameter.startsWith('q='))?.slice(2);
    return { type, q: q === undefined ? 1 : Number(q) || 0 };
  });
  const qOf = (type: string) =>
    Math.max(0, ...offers.filter((offer) => offer.type === type).map(({ q }) => q));
  const csv = qOf('text/csv');
  const arrow = qOf(arrowType);
  const json = qOf('application/json');
  if (Math.max(csv, arrow) === 0 || json >= Math.max(csv, arrow)) return null;
  return arrow > csv ? arrowType : 'text/csv';
}
