/** Hands a text to the person as a file. */

/** How long the text stays reachable for the browser to take it. */
const KEEP_URL_MS = 60_000;

/** A name that every file system takes: letters, figures, dots and hyphens. */
export function fileName(name: string, otherwise: string, extension: string): string {
  const plain = name.trim().replaceAll(/[^\p{L}\p{N}.-]+/gu, '-').replaceAll(/^[-.]+|[-.]+$/g, '').slice(0, 80);
  return `${plain === '' ? otherwise : plain}.${extension}`;
}

export function saveTextAsFile(name: string, text: string, mediaType: string): void {
  const url = URL.createObjectURL(new Blob([text], { type: mediaType }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  document.body.append(link);
  link.click();
  link.remove();
  setTimeout(() => URL.revokeObjectURL(url), KEEP_URL_MS);
}
