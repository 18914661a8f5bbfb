import zlib from 'node:zlib';
import crc32 from 'crc-32';

/*
 * archiver reckons the CRC-32 of every file with this package, in JavaScript: a quarter of the time an archive takes. Node's own is the same
 * sum (the polynomial of ISO/IEC 13239), five times as fast. The first chunk of a file comes with four zero bytes in place of a number.
 */
crc32.buf = (bytes, before) => zlib.crc32(bytes as Uint8Array, typeof before === 'number' ? before >>> 0 : 0);
