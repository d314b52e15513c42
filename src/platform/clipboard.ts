/** Puts a text on the clipboard. */

/** True where the browser took it; false where it is not allowed (no permission, or a page opened without https). */
export async function copyText(text: string): Promise<boolean> {
  try {
    await navigator.clipboard.writeText(text);
    return true;
  } catch {
    return false;
  }
}
