import { Blob as NodeBlob } from 'node:buffer';
import { gunzipSync } from 'node:zlib';
import { afterAll, describe, expect, test, vi } from 'vitest';
import { packed, unpacked } from '../../src/platform/packed.ts';

// The test page's own Blob has no stream.
vi.stubGlobal('Blob', NodeBlob);
afterAll(() => vi.unstubAllGlobals());

const blobOf = (n: number): Blob => new Blob([Uint8Array.from({ length: n }, (_, i) => (i * i * 31 + (i >> 3)) & 255)]);
const bytesOf = async (blob: Blob): Promise<Uint8Array> => new Uint8Array(await blob.arrayBuffer());

describe('bytes in a session file', () => {
  test.each([0, 1, 2, 3, 1000, 2_000_000])('%d bytes come back as they were', async (n) => {
    const whole = blobOf(n);
    const back = await unpacked(await packed(whole));
    expect(Buffer.compare(await bytesOf(back!), await bytesOf(whole))).toBe(0);
  });

  test('they are gzip in base64, as any other program unpacks them', async () => {
    const whole = blobOf(5000);
    expect(new Uint8Array(gunzipSync(Buffer.from(await packed(whole), 'base64')))).toEqual(await bytesOf(whole));
  });

  test.each(['%%%', 'AAAA', ''])('"%s" is none', async (text) => {
    expect(await unpacked(text)).toBeNull();
  });
});
