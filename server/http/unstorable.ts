const deepest = 24;

/** Why a value from outside cannot be stored, in words; null when it can. PostgreSQL stores neither a NUL character nor
 * half of a surrogate pair, and a value nested without end exhausts the stack of whoever walks it. Walks without
 * recursion for that very reason.
 */
export function unstorable(value: unknown): string | null {
  const waiting: { value: unknown; depth: number }[] = [{ value, depth: 0 }];
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    if (typeof next.value === 'string' && !isStorable(next.value))
      return 'there are characters in it that cannot be stored';
    if (typeof next.value !== 'object' || next.value === null) continue;
    if (next.depth >= deepest) return 'it is nested too deep';
    for (const [key, inner] of Object.entries(next.value)) {
      if (!isStorable(key)) return 'there are characters in it that cannot be stored';
      waiting.push({ value: inner, depth: next.depth + 1 });
    }
  }
  return null;
}

const isStorable = (text: string) => !text.includes('\u0000') && text.isWellFormed();
