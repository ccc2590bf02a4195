/** A title as a file's name: without what file systems refuse, never empty. */
export function fileName(title: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is refused.
  const cleaned = title.replace(/\s*[\\/:*?"<>|\u0000-\u001f]+\s*/g, ' ').trim();
  return cleaned === '' || cleaned.startsWith('.') ? `fettle ${cleaned}`.trim() : cleaned;
}
