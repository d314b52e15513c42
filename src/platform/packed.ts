/** Bytes as they stand in a session file: compressed (gzip) and written in base64; and the way back. */

/** Bytes turned to text or back at a time, so that the page stays awake. A multiple of 3 and of 4. */
const PIECE = 3 * 4 * 65_536;

const pause = (): Promise<void> => new Promise((resolve) => {
  setTimeout(resolve, 0);
});

async function bytesThrough(bytes: Blob, through: CompressionStream | DecompressionStream): Promise<Uint8Array<ArrayBuffer>> {
  const stream = bytes.stream().pipeThrough(through);
  return new Uint8Array(await new Response(stream).arrayBuffer());
}

/** gzip (RFC 1952), then base64 (RFC 4648). */
export async function packed(bytes: Blob): Promise<string> {
  const small = await bytesThrough(bytes, new CompressionStream('gzip'));
  const texts: string[] = [];
  for (let from = 0; from < small.length; from += PIECE) {
    let binary = '';
    // apply() takes so many arguments and no more.
    for (let at = from; at < Math.min(small.length, from + PIECE); at += 8192) binary += String.fromCharCode(...small.subarray(at, Math.min(at + 8192, from + PIECE)));
    texts.push(btoa(binary));
    await pause();
  }
  return texts.join('');
}

/** null where the text is no base64, or what it holds no gzip. */
export async function unpacked(text: string): Promise<Blob | null> {
  const pieces: Uint8Array<ArrayBuffer>[] = [];
  try {
    for (let from = 0; from < text.length; from += PIECE) {
      pieces.push(Uint8Array.from(atob(text.slice(from, from + PIECE)), (character) => character.charCodeAt(0)));
      await pause();
    }
    return new Blob([await bytesThrough(new Blob(pieces), new DecompressionStream('gzip'))]);
  } catch {
    return null;
  }
}
