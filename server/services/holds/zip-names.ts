/**
 * Names of the files in a ZIP, read from its central directory, or null when it is none. Nothing is unpacked.
 * (PKWARE APPNOTE 4.3.12 and 4.3.16.)
 */
export function zipNames(bytes: Buffer): string[] | null {
  if (bytes.length < 22 || bytes.readUInt32LE(0) !== 0x04034b50) return null;
  const furthest = Math.max(0, bytes.length - 22 - 0xffff);
  for (let end = bytes.length - 22; end >= furthest; end--) {
    if (bytes.readUInt32LE(end) === 0x06054b50) return namesFrom(bytes, end);
  }
  return null;
}

function namesFrom(bytes: Buffer, end: number): string[] | null {
  const fileCount = bytes.readUInt16LE(end + 10);
  let place = bytes.readUInt32LE(end + 16);
  const names: string[] = [];
  for (let index = 0; index < fileCount; index++) {
    if (place + 46 > end || bytes.readUInt32LE(place) !== 0x02014b50) return null;
    const [name, extra, comment] = [28, 30, 32].map((at) => bytes.readUInt16LE(place + at)) as [
      number,
      number,
      number,
    ];
    names.push(bytes.toString('utf8', place + 46, place + 46 + name));
    place += 46 + name + extra + comment;
  }
  return names;
}
