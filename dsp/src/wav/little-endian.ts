/** Looks at bytes as a DataView does, whatever array they stand in. */
export function viewOf(bytes: Uint8Array): DataView {
  return new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
}

/** Reads the four bytes of a chunk's name as text, one letter a byte. */
export function fourLetters(bytes: Uint8Array, offset = 0): string {
  return String.fromCharCode(...bytes.subarray(offset, offset + 4));
}

/** Writes text as one byte a letter; the caller has seen to it that it is ASCII. */
export function putText(bytes: Uint8Array, offset: number, text: string): void {
  for (let n = 0; n < text.length; n++) {
    bytes[offset + n] = text.charCodeAt(n);
  }
}

/** Writes bytes as people read them, `64 61 74 61`. */
export function hexOf(bytes: Uint8Array): string {
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join(' ');
}

/** Says in words how many bytes there are. */
export function byteCount(count: number): string {
  return count === 1 ? '1 byte' : `${count} bytes`;
}
