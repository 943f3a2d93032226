// A unit under test in the pipe: y = x + 0.001 x² + 0.002 x³ on 32-bit floats from standard input to standard output.
let rest = Buffer.alloc(0);

process.stdin.on('data', (chunk) => {
  const bytes = Buffer.concat([rest, chunk]);
  const whole = bytes.length - (bytes.length % 4);
  rest = bytes.subarray(whole);
  const out = Buffer.alloc(whole);
  for (let at = 0; at < whole; at += 4) {
    const x = bytes.readFloatLE(at);
    out.writeFloatLE(x + 0.001 * x * x + 0.002 * x * x * x, at);
  }
  process.stdout.write(out);
});
process.stdin.on('end', () => process.exit(0));
