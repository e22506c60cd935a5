/** A rendering process that takes more and more memory. */
const taken: Buffer[] = [];
process.on('message', () => {
  setInterval(() => taken.push(Buffer.alloc(20_000_000, 1)), 20);
});
