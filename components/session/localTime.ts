/** An instant in the reader's own time: the day only when it is another one. */
export function localTime(atIso: string, now: Date = new Date()): string {
  const at = new Date(atIso);
  const time = at.toLocaleTimeString([], { hour: '2-digit', minute: '2-digit', hour12: false });
  return at.toDateString() === now.toDateString() ? time : `${localDay(at, now)} ${time}`;
}

function localDay(at: Date, now: Date): string {
  const year = at.getFullYear() === now.getFullYear() ? {} : ({ year: 'numeric' } as const);
  return at.toLocaleDateString('en-GB', { day: 'numeric', month: 'short', ...year });
}

/** How long ago, in the largest unit that fits: "3 min ago". */
export function agoInWords(atIso: string, now: Date = new Date()): string {
  const minutes = Math.floor((now.getTime() - Date.parse(atIso)) / 60_000);
  if (minutes < 1) return 'just now';
  if (minutes < 60) return `${minutes} min ago`;
  if (minutes < 24 * 60) return `${Math.floor(minutes / 60)} h ago`;
  const days = Math.floor(minutes / (24 * 60));
  return days === 1 ? '1 day ago' : `${days} days ago`;
}
