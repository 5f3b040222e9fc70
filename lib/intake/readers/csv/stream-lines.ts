import { isUtf8 } from 'node:buffer';
import type { ByteSource } from '@/lib/intake/byte-source';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { streamBytes } from '@/lib/intake/readers/stream-bytes';

const MAX_LINE_BYTES = 64 * 1024 * 1024;
const NEWLINE = 0x0a;

/**
 * The text of a file in blocks of whole lines, without a byte-order mark. Text that is not UTF-8, or that holds a NUL, is
 * refused with its line.
 */
export async function* streamLines(source: ByteSource): AsyncGenerator<string, void, undefined> {
  let carried: Buffer[] = [];
  let carriedBytes = 0;
  let line = 1;
  let isFirst = true;
  const take = (block: Buffer): string => {
    checkBlock(block, line);
    for (let at = block.indexOf(NEWLINE); at !== -1; at = block.indexOf(NEWLINE, at + 1)) line += 1;
    const text = block.toString('utf8');
    const marked = isFirst && text.startsWith('\ufeff');
    isFirst = false;
    return marked ? text.slice(1) : text;
  };
  for await (const slab of streamBytes(source, 0, source.sizeBytes)) {
    const bytes = Buffer.from(slab.buffer, slab.byteOffset, slab.byteLength);
    if (isFirst && carriedBytes === 0 && bytes.length >= 2) refuseUtf16(bytes);
    const last = bytes.lastIndexOf(NEWLINE);
    if (last === -1) {
      carried.push(bytes);
      carriedBytes += bytes.length;
      if (carriedBytes > MAX_LINE_BYTES)
        throw new IntakeRefusal(
          'csv-line-length',
          `Line ${line} is longer than 64 MiB.`,
          'Check that the file is a table with one row a line.',
          { line },
        );
      continue;
    }
    yield take(Buffer.concat([...carried, bytes.subarray(0, last + 1)]));
    carried = [bytes.subarray(last + 1)];
    carriedBytes = carried[0].length;
  }
  if (carriedBytes > 0) yield take(Buffer.concat(carried));
}

function refuseUtf16(bytes: Buffer): void {
  if ((bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff))
    throw new IntakeRefusal('csv-encoding', 'The text is UTF-16.', 'Save the table as UTF-8.', { line: 1 });
}

function checkBlock(block: Buffer, firstLine: number): void {
  const nul = block.indexOf(0);
  const bad = !isUtf8(block);
  if (nul === -1 && !bad) return;
  let line = firstLine;
  for (let from = 0; from < block.length; line += 1) {
    const end = block.indexOf(NEWLINE, from);
    const text = block.subarray(from, end === -1 ? block.length : end);
    if (text.includes(0))
      throw new IntakeRefusal(
        'csv-nul',
        `Line ${line} holds a NUL byte, so this is not a text table.`,
        'Export the table again as UTF-8 text.',
        { line },
      );
    if (!isUtf8(text))
      throw new IntakeRefusal(
        'csv-encoding',
        `Line ${line} is not valid UTF-8.`,
        'Save the table with the encoding UTF-8.',
        { line },
      );
    from = end === -1 ? block.length : end + 1;
  }
}
