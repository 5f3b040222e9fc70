/** SHA-256 of some octets as 64 hexadecimal digits, computed off the page's thread; null where the browser offers none (no https). */
export async function hashOctets(octets: Blob): Promise<string | null> {
  if (globalThis.crypto?.subtle === undefined) return null;
  const digest = await crypto.subtle.digest('SHA-256', await octets.arrayBuffer());
  return Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('');
}
