/** Checksum of PNG chunks, bit by bit (PNG, third edition, 5.5): enough for a few bytes. */
function crc32(bytes: Uint8Array): number {
  let crc = -1;
  for (const byte of bytes) {
    crc ^= byte;
    for (let bit = 0; bit < 8; bit++) crc = (crc >>> 1) ^ (crc & 1 ? 0xedb88320 : 0);
  }
  return ~crc >>> 0;
}

/** One PNG chunk with its length and checksum (PNG, third edition, 5.3). */
export function pngChunk(type: string, body: ArrayLike<number>): Buffer {
  const chunk = Buffer.alloc(12 + body.length);
  chunk.writeUInt32BE(body.length, 0);
  chunk.write(type, 4, 'latin1');
  chunk.set(Uint8Array.from(body), 8);
  chunk.writeUInt32BE(crc32(chunk.subarray(4, 8 + body.length)), 8 + body.length);
  return chunk;
}

/** The PNG with more chunks right after its header. */
export const withChunks = (png: Buffer, chunks: readonly Buffer[]): Buffer =>
  Buffer.concat([png.subarray(0, 33), ...chunks, png.subarray(33)]);
