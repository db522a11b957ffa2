import { createHash } from 'node:crypto';

/**
 * A stable UUID from a name, of version 8 (RFC 9562, 5.8: the bits are ours). It says nothing about the person whose call it is, as
 * RFC 7986 (5.3) asks, and planning the same file again gives the same one, so that a calendar updates instead of doubling.
 */
export function uidOf(...name: string[]): string {
  const bytes = createHash('sha256').update(JSON.stringify(name)).digest().subarray(0, 16);
  bytes[6] = (bytes[6]! & 0x0f) | 0x80;
  bytes[8] = (bytes[8]! & 0x3f) | 0x80;
  const hex = bytes.toString('hex');
  return [hex.slice(0, 8), hex.slice(8, 12), hex.slice(12, 16), hex.slice(16, 20), hex.slice(20)].join('-');
}
