/** The document's sentence about the heard variant, without the words that say which variant that is. */
export function bareSentence(sentence: string): string {
  return sentence.replace(/^variants\[\d+\]\./, '');
}

/** The same with the name that a value has on the page, where the document's sentence names it by its path. */
export function namedSentence(sentence: string | null, path: string, name: string): string | null {
  if (sentence === null) return null;
  const bare = bareSentence(sentence);
  return bare.startsWith(`${path} `) ? `${name}${bare.slice(path.length)}` : bare;
}
