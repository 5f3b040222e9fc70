import type { ByteSource } from '@/lib/intake/byte-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';

const PROBE_BYTES = 1024 * 1024;

/** Tells comma from tab by the header line. Semicolons are refused: with them, decimal commas cannot be told from anything. */
export async function sniffDelimiter(source: ByteSource): Promise<',' | '\t'> {
  const bytes = await source.read(0, Math.min(PROBE_BYTES, source.sizeBytes));
  const text = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength).toString('latin1');
  const header = text.split(/\r\n|\n|\r/, 1)[0].replace(/"[^"]*"/g, '');
  const count = (mark: string): number => header.split(mark).length - 1;
  const [commas, tabs, semicolons] = [count(','), count('\t'), count(';')];
  if (semicolons > 0 && commas === 0 && tabs === 0)
    throw new IntakeRefusal(
      'csv-semicolon',
      'The columns are separated by semicolons.',
      'Export the table with commas or tabs between the columns and with decimal points.',
      { line: 1 },
    );
  return tabs > 0 && tabs >= commas ? '\t' : ',';
}
