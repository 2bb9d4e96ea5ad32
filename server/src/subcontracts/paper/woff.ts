import { inflateSync } from 'node:zlib';

const SIGNATURE = 0x774f4646; // "wOFF"
const WOFF_HEADER = 44;
const WOFF_ENTRY = 20;
const SFNT_HEADER = 12;
const SFNT_ENTRY = 16;

/**
 * A WOFF font as the plain font inside it, all tables unpacked. PDF drawing looks tables up all the time and would
 * unpack them again each time, in JavaScript, which takes longer than everything else together.
 * Source: W3C, WOFF File Format 1.0, sections 3 to 5; the plain layout is OpenType's table directory.
 * @throws Error when the bytes are no WOFF 1.0
 */
export function unpackWoff(woff: Buffer): Buffer {
  if (woff.readUInt32BE(0) !== SIGNATURE) throw new Error('not a WOFF 1.0 font');
  const count = woff.readUInt16BE(12);
  const header = Buffer.alloc(SFNT_HEADER + count * SFNT_ENTRY);
  woff.copy(header, 0, 4, 8);
  header.writeUInt16BE(count, 4);
  const power = Math.floor(Math.log2(count));
  header.writeUInt16BE(2 ** power * SFNT_ENTRY, 6);
  header.writeUInt16BE(power, 8);
  header.writeUInt16BE(count * SFNT_ENTRY - 2 ** power * SFNT_ENTRY, 10);
  const tables: Buffer[] = [];
  let offset = header.length;
  for (let index = 0; index < count; index += 1) {
    const entry = WOFF_HEADER + index * WOFF_ENTRY;
    const table = readTable(woff, entry);
    const place = SFNT_HEADER + index * SFNT_ENTRY;
    woff.copy(header, place, entry, entry + 4);
    woff.copy(header, place + 4, entry + 16, entry + 20);
    header.writeUInt32BE(offset, place + 8);
    header.writeUInt32BE(table.length, place + 12);
    // Every table begins at a multiple of four.
    const padded = Buffer.alloc(Math.ceil(table.length / 4) * 4);
    table.copy(padded);
    tables.push(padded);
    offset += padded.length;
  }
  return Buffer.concat([header, ...tables]);
}

/** A table is packed only where that makes it smaller. */
function readTable(woff: Buffer, entry: number): Buffer {
  const offset = woff.readUInt32BE(entry + 4);
  const packedLength = woff.readUInt32BE(entry + 8);
  const length = woff.readUInt32BE(entry + 12);
  const packed = woff.subarray(offset, offset + packedLength);
  const table = packedLength < length ? inflateSync(packed) : packed;
  if (table.length !== length) throw new Error('a damaged WOFF table');
  return table;
}
