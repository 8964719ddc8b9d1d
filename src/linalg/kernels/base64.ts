/** Base64 (RFC 4648, section 4) to bytes: the core has neither `atob` nor `Buffer` everywhere it runs. */
const ALPHABET = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";

export function bytesFromBase64(text: string): Uint8Array<ArrayBuffer> {
  const valueOf = new Uint8Array(128);
  for (let i = 0; i < 64; i++) valueOf[ALPHABET.charCodeAt(i)] = i;
  const padding = text.endsWith("==") ? 2 : text.endsWith("=") ? 1 : 0;
  const bytes = new Uint8Array((text.length / 4) * 3 - padding);
  let place = 0;
  for (let i = 0; i < text.length; i += 4) {
    const word =
      (valueOf[text.charCodeAt(i)]! << 18) |
      (valueOf[text.charCodeAt(i + 1)]! << 12) |
      (valueOf[text.charCodeAt(i + 2)]! << 6) |
      valueOf[text.charCodeAt(i + 3)]!;
    // Writes behind the end (the padding) are dropped by the typed array.
    bytes[place++] = word >> 16;
    bytes[place++] = word >> 8;
    bytes[place++] = word;
  }
  return bytes;
}
