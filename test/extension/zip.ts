import { inflateRawSync } from "node:zlib";

/** Files of a ZIP archive by name (APPNOTE 6.3: end record, central directory, local headers; stored or deflated). */
export function unzip(archive: Buffer): Map<string, Buffer> {
  const end = archive.lastIndexOf(Buffer.from([0x50, 0x4b, 5, 6]));
  const files = new Map<string, Buffer>();
  let at = archive.readUInt32LE(end + 16);
  for (let i = archive.readUInt16LE(end + 10); i > 0; i--) {
    const nameLength = archive.readUInt16LE(at + 28);
    const name = archive.toString("utf8", at + 46, at + 46 + nameLength);
    const local = archive.readUInt32LE(at + 42);
    const start = local + 30 + archive.readUInt16LE(local + 26) + archive.readUInt16LE(local + 28);
    const data = archive.subarray(start, start + archive.readUInt32LE(at + 20));
    files.set(name, archive.readUInt16LE(at + 10) === 0 ? data : inflateRawSync(data));
    at += 46 + nameLength + archive.readUInt16LE(at + 30) + archive.readUInt16LE(at + 32);
  }
  return files;
}
