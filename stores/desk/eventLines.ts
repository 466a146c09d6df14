/** Reads a stream of server-sent events and reports each event, with its name and data. What carries no data is reported
 * too, as `beat`: it shows that the line still stands.
 */
export async function readEvents(
  body: ReadableStream<Uint8Array>,
  report: (event: { name: string; data: string }) => void,
): Promise<void> {
  const reader = body.getReader();
  const decoder = new TextDecoder();
  let rest = '';
  for (;;) {
    const { value, done } = await reader.read();
    if (done) return;
    const blocks = (rest + decoder.decode(value, { stream: true })).replaceAll('\r\n', '\n').split('\n\n');
    rest = blocks.pop() ?? '';
    for (const block of blocks) report(eventOf(block));
  }
}

function eventOf(block: string): { name: string; data: string } {
  const lines = block.split('\n');
  const valueOf = (field: string) =>
    lines.filter((line) => line.startsWith(`${field}:`)).map((line) => line.slice(field.length + 1).trim());
  const data = valueOf('data').join('\n');
  // comments and settings of the line carry no data
  const isBeat = data === '';
  return { name: isBeat ? 'beat' : (valueOf('event')[0] ?? 'message'), data };
}
