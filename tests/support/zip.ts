import { crc32 } from 'node:zlib';

/** A ZIP file of the given texts, stored or compressed; enough for what reads it in the tests. */
export function zip(
  files: [name: string, text: string][],
  compress?: (bytes: Buffer) => Buffer,
): Buffer {
  const bodies: Buffer[] = [];
  const directory: Buffer[] = [];
  let offset = 0;
  for (const [name, text] of files) {
    const plain = Buffer.from(text);
    const packed = compress ? compress(plain) : plain;
    const common = Buffer.alloc(26);
    common.writeUInt16LE(20, 0);
    common.writeUInt16LE(compress ? 8 : 0, 4);
    common.writeUInt32LE(crc32(plain), 10);
    common.writeUInt32LE(packed.length, 14);
    common.writeUInt32LE(plain.length, 18);
    common.writeUInt16LE(name.length, 22);
    bodies.push(Buffer.from('PK\u0003\u0004', 'latin1'), common, Buffer.from(name), packed);
    const tail = Buffer.alloc(14);
    tail.writeUInt32LE(offset, 10);
    directory.push(
      Buffer.from('PK\u0001\u0002', 'latin1'),
      Buffer.from([20, 0]),
      common.subarray(0, 26),
      tail,
      Buffer.from(name),
    );
    offset += 30 + name.length + packed.length;
  }
  const size = directory.reduce((sum, piece) => sum + piece.length, 0);
  const end = Buffer.alloc(22);
  end.write('PK\u0005\u0006', 0, 'latin1');
  end.writeUInt16LE(files.length, 8);
  end.writeUInt16LE(files.length, 10);
  end.writeUInt32LE(size, 12);
  end.writeUInt32LE(offset, 16);
  return Buffer.concat([...bodies, ...directory, end]);
}
