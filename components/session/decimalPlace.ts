/** Digits after the decimal mark of a number as keyed, the mark counted. */
function tailLength(text: string): number {
  const at = text.search(/[.,]/);
  return at < 0 ? 0 : text.length - at;
}

/** How many characters each text has to be moved to the left so that the decimal marks stand under one another when
 * the column is set flush right in a fixed-width face. The texts themselves stay as they were keyed.
 * @example decimalIndents(['31', '29.3', '7,25']) // [3, 1, 0]
 */
export function decimalIndents(texts: readonly string[]): number[] {
  const tails = texts.map(tailLength);
  const longest = Math.max(0, ...tails);
  return tails.map((tail) => longest - tail);
}
