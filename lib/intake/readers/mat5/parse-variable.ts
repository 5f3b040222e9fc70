import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import type { MatNode, StoredValues } from '@/lib/intake/readers/mat5/mat5-nodes';
import {
  miMatrix,
  mxCell,
  mxChar,
  mxSparse,
  mxStruct,
  numericClasses,
  storedTypes,
} from '@/lib/intake/readers/mat5/mat5-types';
import type { PullBytes } from '@/lib/intake/readers/pull-bytes';

const MAX_DEPTH = 24;
const MAX_NODES = 200_000;
const MAX_TEXT_BYTES = 1024 * 1024;
const REMEDY = 'Save the file again (with -v7 or -v7.3) and send that.';

interface Tag {
  type: number;
  nBytes: number;
  /** Padding after the data, up to the next multiple of 8; none inside a short element. */
  padding: number;
}

/**
 * Reads the structure of one variable from its bytes, one element after another, passing over the numbers. Every length is
 * checked against the element that holds it before anything is read.
 * Source: the published MAT-File Format description, Level 5.
 */
export class VariableParser {
  readonly #bytes: PullBytes;
  readonly #isLittle: boolean;
  readonly #variable: string;
  #nodes = 0;

  constructor(bytes: PullBytes, isLittle: boolean, variable: string) {
    this.#bytes = bytes;
    this.#isLittle = isLittle;
    this.#variable = variable;
  }

  /** The variable's name and content; the stream stands at the element's tag. */
  async parse(): Promise<{ name: string; node: MatNode }> {
    const tag = await this.#tag();
    if (tag.type !== miMatrix)
      throw this.#refusal('mat5-element', `an element of type ${tag.type} stands where an array is expected`);
    return this.#matrix(tag.nBytes, 0);
  }

  async #matrix(nBytes: number, depth: number): Promise<{ name: string; node: MatNode }> {
    const end = this.#bytes.position + nBytes;
    if (depth > MAX_DEPTH)
      throw this.#refusal('mat5-depth', `structs and cells are nested more than ${MAX_DEPTH} deep`);
    if (++this.#nodes > MAX_NODES)
      throw this.#refusal('mat5-nodes', `it holds more than ${MAX_NODES} arrays`);
    if (nBytes === 0)
      return {
        name: '',
        node: {
          kind: 'numbers',
          dtype: 'float64',
          shape: [0, 0],
          values: { position: end, nBytes: 0, storedType: 9 },
        },
      };
    const flags = await this.#small(6, 8, end);
    const view = new DataView(flags.buffer);
    const word = view.getUint32(0, this.#isLittle);
    const mxClass = word & 0xff;
    const isComplex = (word & 0x800) !== 0;
    const isLogical = (word & 0x200) !== 0;
    if (mxClass >= 16) {
      // Function handles and opaque objects have a layout of their own, which is passed over whole.
      await this.#passTo(end);
      return { name: '', node: { kind: 'other', what: mxClass === 16 ? 'a function handle' : 'an object' } };
    }
    const shape = await this.#shape(end);
    const name = new TextDecoder('latin1').decode(await this.#small(1, 4096, end));
    const node = await this.#content(mxClass, shape, { isComplex, isLogical }, end, depth);
    if (this.#bytes.position > end)
      throw this.#refusal('mat5-length', 'an array is longer than the element that holds it');
    await this.#passTo(end);
    return { name, node };
  }

  async #content(
    mxClass: number,
    shape: number[],
    facts: { isComplex: boolean; isLogical: boolean },
    end: number,
    depth: number,
  ): Promise<MatNode> {
    const nValues = shape.reduce((product, length) => product * length, 1);
    if (facts.isComplex) return { kind: 'other', what: 'complex numbers' };
    if (mxClass === mxChar) {
      return { kind: 'text', shape, text: await this.#text(end) };
    }
    if (mxClass === mxSparse) {
      const rows = await this.#values(end);
      const columnStarts = await this.#values(end);
      return { kind: 'sparse', shape, rows, columnStarts, values: await this.#values(end) };
    }
    if (mxClass === mxCell) {
      if (nValues > MAX_NODES) throw this.#refusal('mat5-nodes', `a cell array claims ${nValues} cells`);
      const items: MatNode[] = [];
      for (let item = 0; item < nValues; item++) items.push(await this.#inner(end, depth));
      return { kind: 'cell', shape, items };
    }
    if (mxClass === mxStruct || mxClass === 3) {
      if (mxClass === 3) await this.#small(1, 4096, end);
      return this.#struct(shape, nValues, end, depth);
    }
    const dtype = numericClasses[mxClass];
    if (dtype === undefined) throw this.#refusal('mat5-class', `an array has the unknown class ${mxClass}`);
    const values = await this.#values(end);
    const { itemBytes } = storedTypes[values.storedType];
    if (values.nBytes !== nValues * itemBytes)
      throw this.#refusal(
        'mat5-size',
        `an array of ${shape.join(' × ')} has ${values.nBytes} bytes of values, not ${nValues * itemBytes}`,
      );
    return { kind: 'numbers', dtype: facts.isLogical ? 'bool' : dtype, shape, values };
  }

  async #struct(shape: number[], nValues: number, end: number, depth: number): Promise<MatNode> {
    const lengths = await this.#small(5, 4, end);
    const nameBytes = new DataView(lengths.buffer).getInt32(0, this.#isLittle);
    const names = await this.#small(1, 1024 * 1024, end);
    if (nameBytes < 1 || nameBytes > 256 || names.length % nameBytes !== 0)
      throw this.#refusal('mat5-fields', `a struct's field names claim ${nameBytes} bytes each`);
    const fields = new Map<string, MatNode[]>();
    const keys: string[] = [];
    for (let at = 0; at < names.length; at += nameBytes) {
      const raw = names.subarray(at, at + nameBytes);
      const stop = raw.indexOf(0);
      const key = new TextDecoder('latin1').decode(stop === -1 ? raw : raw.subarray(0, stop));
      if (fields.has(key)) throw this.#refusal('mat5-fields', `a struct has two fields named “${key}”`);
      fields.set(key, []);
      keys.push(key);
    }
    if (nValues * keys.length > MAX_NODES)
      throw this.#refusal('mat5-nodes', `a struct array claims ${nValues * keys.length} fields`);
    for (let item = 0; item < nValues; item++)
      for (const key of keys) fields.get(key)?.push(await this.#inner(end, depth));
    return { kind: 'struct', shape, fields };
  }

  async #inner(end: number, depth: number): Promise<MatNode> {
    const tag = await this.#tag();
    if (tag.type !== miMatrix)
      throw this.#refusal('mat5-element', `an element of type ${tag.type} stands where an array is expected`);
    if (this.#bytes.position + tag.nBytes > end)
      throw this.#refusal('mat5-length', 'an array is longer than the element that holds it');
    return (await this.#matrix(tag.nBytes, depth + 1)).node;
  }

  async #shape(end: number): Promise<number[]> {
    const bytes = await this.#small(5, 4 * 32, end);
    const view = new DataView(bytes.buffer);
    const shape = Array.from({ length: bytes.length / 4 }, (_, axis) =>
      view.getInt32(axis * 4, this.#isLittle),
    );
    const product = shape.reduce((all, length) => all * length, 1);
    if (shape.length < 2 || shape.some((length) => length < 0) || !Number.isSafeInteger(product * 8))
      throw this.#refusal('mat5-shape', `an array claims the shape ${shape.join(' × ')}`);
    return shape;
  }

  /** A short element that is held: its type must be the expected one, its length at most `maxBytes`. */
  async #small(type: number, maxBytes: number, end: number): Promise<Uint8Array<ArrayBuffer>> {
    const tag = await this.#tag();
    // Names may come as UTF-8.
    if (tag.type !== type && !(type === 1 && (tag.type === 16 || tag.type === 2)))
      throw this.#refusal(
        'mat5-element',
        `an element of type ${tag.type} stands where one of type ${type} is expected`,
      );
    if (tag.nBytes > maxBytes || this.#bytes.position + tag.nBytes > end)
      throw this.#refusal('mat5-length', `a header element claims ${tag.nBytes} bytes`);
    if (type === 6 && tag.nBytes !== 8)
      throw this.#refusal('mat5-length', `an array's flags have ${tag.nBytes} bytes, not 8`);
    if (type === 5 && (tag.nBytes % 4 !== 0 || tag.nBytes === 0))
      throw this.#refusal('mat5-length', `an array's shape has ${tag.nBytes} bytes`);
    const bytes = await this.#bytes.take(tag.nBytes);
    if (bytes === null || !(await this.#bytes.skip(tag.padding))) throw this.#truncated();
    return Uint8Array.from(bytes);
  }

  /** An element of values, which is passed over; where it lies is kept. */
  async #values(end: number): Promise<StoredValues> {
    const tag = await this.#tag();
    const position = this.#bytes.position;
    if (!Object.hasOwn(storedTypes, tag.type))
      throw this.#refusal('mat5-element', `values have the unknown type ${tag.type}`);
    if (position + tag.nBytes > end)
      throw this.#refusal('mat5-length', 'the values of an array are longer than the element that holds it');
    if (!(await this.#bytes.skip(tag.nBytes + tag.padding))) throw this.#truncated();
    return { position, nBytes: tag.nBytes, storedType: tag.type };
  }

  async #text(end: number): Promise<string> {
    const tag = await this.#tag();
    const encoding = { 1: 'latin1', 2: 'latin1', 16: 'utf-8', 4: 'utf-16', 17: 'utf-16' }[tag.type];
    if (encoding === undefined) throw this.#refusal('mat5-element', `text has the unknown type ${tag.type}`);
    if (tag.nBytes > MAX_TEXT_BYTES || this.#bytes.position + tag.nBytes > end)
      throw this.#refusal('mat5-length', `a text claims ${tag.nBytes} bytes`);
    const bytes = await this.#bytes.take(tag.nBytes);
    if (bytes === null || !(await this.#bytes.skip(tag.padding))) throw this.#truncated();
    const name = encoding === 'utf-16' ? (this.#isLittle ? 'utf-16le' : 'utf-16be') : encoding;
    return new TextDecoder(name).decode(bytes);
  }

  async #tag(): Promise<Tag> {
    const bytes = await this.#bytes.take(4);
    if (bytes === null) throw this.#truncated();
    const word = new DataView(bytes.buffer, bytes.byteOffset).getUint32(0, this.#isLittle);
    const shortBytes = word >>> 16;
    if (shortBytes !== 0) {
      if (shortBytes > 4) throw this.#refusal('mat5-element', `a short element claims ${shortBytes} bytes`);
      return { type: word & 0xffff, nBytes: shortBytes, padding: 4 - shortBytes };
    }
    const rest = await this.#bytes.take(4);
    if (rest === null) throw this.#truncated();
    const nBytes = new DataView(rest.buffer, rest.byteOffset).getUint32(0, this.#isLittle);
    return { type: word, nBytes, padding: word === miMatrix ? 0 : (8 - (nBytes % 8)) % 8 };
  }

  async #passTo(end: number): Promise<void> {
    if (!(await this.#bytes.skip(Math.max(0, end - this.#bytes.position)))) throw this.#truncated();
  }

  #truncated(): IntakeRefusal {
    return this.#refusal('mat5-truncated', 'it ends too early');
  }

  #refusal(code: string, what: string): IntakeRefusal {
    return new IntakeRefusal(code, `The file is damaged in ${this.#variable}: ${what}.`, REMEDY);
  }
}
