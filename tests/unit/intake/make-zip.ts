import { crc32, deflateRawSync } from 'node:zlib';

/** One member of a ZIP built by hand; every field may be given a wrong value. */
export interface Member {
  name: string | Uint8Array;
  data: Uint8Array;
  method?: number;
  packed?: Uint8Array;
  crc?: number;
  size?: number;
  packedSize?: number;
  flags?: number;
  offset?: number;
}

/** A ZIP archive (APPNOTE 6.3.10 layout) of the given members; `count` overrides the number in the end record. */
export function makeZip(
  members: readonly Member[],
  options: { count?: number; directoryOffset?: number } = {},
): Uint8Array {
  const locals: Buffer[] = [];
  const directory: Buffer[] = [];
  let at = 0;
  for (const member of members) {
    const name = Buffer.from(member.name);
    const method = member.method ?? 8;
    const packed = Buffer.from(member.packed ?? (method === 8 ? deflateRawSync(member.data) : member.data));
    const crc = member.crc ?? crc32(member.data);
    const size = member.size ?? member.data.length;
    const packedSize = member.packedSize ?? packed.length;
    const flags = member.flags ?? 0x800;
    const local = Buffer.alloc(30);
    local.writeUInt32LE(0x04034b50, 0);
    local.writeUInt16LE(20, 4);
    local.writeUInt16LE(flags, 6);
    local.writeUInt16LE(method, 8);
    local.writeUInt32LE(crc >>> 0, 14);
    local.writeUInt32LE(packedSize >>> 0, 18);
    local.writeUInt32LE(size >>> 0, 22);
    local.writeUInt16LE(name.length, 26);
    const central = Buffer.alloc(46);
    central.writeUInt32LE(0x02014b50, 0);
    central.writeUInt16LE(20, 4);
    central.writeUInt16LE(20, 6);
    central.writeUInt16LE(flags, 8);
    central.writeUInt16LE(method, 10);
    central.writeUInt32LE(crc >>> 0, 16);
    central.writeUInt32LE(packedSize >>> 0, 20);
    central.writeUInt32LE(size >>> 0, 24);
    central.writeUInt16LE(name.length, 28);
    central.writeUInt32LE(member.offset ?? at, 42);
    locals.push(local, name, packed);
    directory.push(central, name);
    at += 30 + name.length + packed.length;
  }
  const directoryBytes = directory.reduce((sum, part) => sum + part.length, 0);
  const end = Buffer.alloc(22);
  end.writeUInt32LE(0x06054b50, 0);
  end.writeUInt16LE(options.count ?? members.length, 8);
  end.writeUInt16LE(options.count ?? members.length, 10);
  end.writeUInt32LE(directoryBytes, 12);
  end.writeUInt32LE(options.directoryOffset ?? at, 16);
  return Uint8Array.from(Buffer.concat([...locals, ...directory, end]));
}
