// Fields as the page holds them: bytes of all numbers apart, each row less the row above it, deflated, base64.

async function inflated(base64) {
  const bytes = Uint8Array.from(atob(base64), (c) => c.charCodeAt(0));
  const stream = new Blob([bytes]).stream().pipeThrough(new DecompressionStream("deflate"));
  return new Uint8Array(await new Response(stream).arrayBuffer());
}

// Numbers of all instants, one after the other; `rows` holds the number of rows of each.
async function unpacked(base64, rows, columns) {
  const bytes = await inflated(base64);
  const count = bytes.length / 4;
  const words = new Uint32Array(count);
  for (let i = 0; i < count; i++) {
    words[i] = bytes[i] | (bytes[count + i] << 8) | (bytes[2 * count + i] << 16) | (bytes[3 * count + i] << 24);
  }
  let start = 0;
  for (const lines of rows) {
    for (let i = start + columns; i < start + lines * columns; i++) words[i] += words[i - columns];
    start += lines * columns;
  }
  return new Float32Array(words.buffer);
}
