/**
 * Pads numbers of one column at the right so that their decimal marks stand under each other in a font of equal widths.
 * Texts without a mark count as ending before it; empty ones stay empty.
 */
export function alignDecimals(texts: string[]): string[] {
  const tail = (text: string) => {
    const at = text.search(/[.,]/);
    return at < 0 ? 0 : text.length - at;
  };
  const longest = Math.max(0, ...texts.map(tail));
  return texts.map((text) => (/\d/.test(text) ? text + '\u00a0'.repeat(longest - tail(text)) : text));
}
