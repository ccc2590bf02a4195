/** The document's sentence about the heard variant, without the words that say which variant that is. */
export function bareSentence(sentence: string): string {
  return sentence.replace(/^variants\[\d+\]\./, '');
}
