import type { ByteSource } from '@/lib/intake/byte-source';
import type { Problem } from '@/lib/contracts/problem';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { exposeNodes, type VariableBytes } from '@/lib/intake/readers/mat5/expose-nodes';
import { inflateVariable, type TopElement } from '@/lib/intake/readers/mat5/inflate-variable';
import { miCompressed, miMatrix } from '@/lib/intake/readers/mat5/mat5-types';
import { VariableParser } from '@/lib/intake/readers/mat5/parse-variable';
import { PullBytes } from '@/lib/intake/readers/pull-bytes';
import type { ReadableArray, ReadableFile } from '@/lib/intake/readers/readable-file';

const HEADER_BYTES = 128;
const MAX_VARIABLES = 5_000;
const REMEDY = 'Save the file again (with -v7 or -v7.3) and send that.';

/** Opens a MAT file of level 5 (versions 6 and 7): structs, cells, sparse, logical and all numeric classes. */
export async function openMat5(source: ByteSource): Promise<ReadableFile> {
  if (source.sizeBytes < HEADER_BYTES)
    throw new IntakeRefusal(
      'mat5-truncated',
      `The file ends after ${source.sizeBytes} bytes, within its header.`,
      REMEDY,
    );
  const header = await source.read(0, HEADER_BYTES);
  const mark = String.fromCharCode(header[126], header[127]);
  if (mark !== 'IM' && mark !== 'MI')
    throw new IntakeRefusal('mat5-endian', 'The header does not say in which order bytes stand.', REMEDY);
  const isLittle = mark === 'IM';
  const version = new DataView(header.buffer, header.byteOffset).getUint16(124, isLittle);
  if (version !== 0x0100)
    throw new IntakeRefusal(
      'mat5-version',
      `The header names the version ${version.toString(16)}; level 5 is 100.`,
      REMEDY,
    );

  const arrays: ReadableArray[] = [];
  const problems: Problem[] = [];
  const names = new Set<string>();
  for (let offset = HEADER_BYTES, n = 1; offset < source.sizeBytes; n++) {
    const variable = `variable ${n}`;
    if (n > MAX_VARIABLES)
      throw new IntakeRefusal(
        'mat5-nodes',
        `The file holds more than ${MAX_VARIABLES} variables.`,
        'Save only those of the session.',
      );
    const element = await topElement(source, offset, isLittle, variable);
    const bytes: VariableBytes = { isLittle, open: () => inflateVariable(source, element, variable) };
    const pull = new PullBytes(bytes.open());
    try {
      const { name, node } = await new VariableParser(pull, isLittle, variable).parse();
      // The unnamed variable keeps what objects refer to.
      if (name !== '') {
        if (names.has(name))
          throw new IntakeRefusal('mat5-duplicate-name', `Two variables are named “${name}”.`, REMEDY, {
            path: name,
          });
        names.add(name);
        const own = exposeNodes(node, name, bytes);
        arrays.push(...own);
        if (own.length === 0)
          problems.push({
            code: 'mat5-left-aside',
            severity: 'notes',
            message: `“${name}” is ${node.kind === 'other' ? node.what : 'not made of arrays that are alike'} and is left aside.`,
            place: { path: name },
          });
      }
    } finally {
      await pull.close();
    }
    offset = element.offset + element.nBytes;
  }
  if (arrays.length === 0) throw new IntakeRefusal('mat5-empty', 'The file holds no array.', REMEDY);
  return { format: 'mat5', arrays, problems, close: () => undefined };
}

async function topElement(
  source: ByteSource,
  offset: number,
  isLittle: boolean,
  variable: string,
): Promise<TopElement> {
  const left = source.sizeBytes - offset;
  const refuse = (code: string, what: string): IntakeRefusal =>
    new IntakeRefusal(code, `The file is damaged in ${variable}: ${what}.`, REMEDY);
  if (left < 8) throw refuse('mat5-truncated', `${left} bytes are left where an element begins`);
  const tag = await source.read(offset, 8);
  const view = new DataView(tag.buffer, tag.byteOffset);
  const type = view.getUint32(0, isLittle);
  const nBytes = view.getUint32(4, isLittle);
  if (type !== miCompressed && type !== miMatrix)
    throw refuse('mat5-element', `an element of type ${type} stands where a variable is expected`);
  if (nBytes > left - 8)
    throw refuse('mat5-truncated', `its element claims ${nBytes} bytes, the file has ${left - 8}`);
  return type === miCompressed
    ? { offset: offset + 8, nBytes, isCompressed: true }
    : { offset, nBytes: nBytes + 8, isCompressed: false };
}
