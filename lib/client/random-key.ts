/** A random key of 128 bits as hexadecimal digits. crypto.randomUUID would need https, which a rig's own network may not have. */
export function randomKey(): string {
  return Array.from(crypto.getRandomValues(new Uint8Array(16)), (byte) =>
    byte.toString(16).padStart(2, '0'),
  ).join('');
}
