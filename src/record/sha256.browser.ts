import type { Sha256 } from './observation.ts';

/** SHA-256 (FIPS 180-4) by the browser's Web Crypto, lower-case hexadecimal. */
export const webSha256: Sha256 = async (bytes) => {
  const digest = await crypto.subtle.digest('SHA-256', bytes as Uint8Array<ArrayBuffer>);
  return Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('');
};
