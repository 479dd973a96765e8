/** Splits a stream of bytes into its lines. Empty lines, which only keep the way open, are left out. */
export async function readLines(stream: ReadableStream<Uint8Array>, take: (line: string) => void): Promise<void> {
  const reader = stream.getReader();
  const decoder = new TextDecoder();
  let rest = '';
  for (;;) {
    const { done, value } = await reader.read();
    if (done) return;
    const lines = (rest + decoder.decode(value, { stream: true })).split('\n');
    rest = lines.pop() ?? '';
    for (const line of lines) {
      if (line !== '') take(line);
    }
  }
}
