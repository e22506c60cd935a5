/** A rendering process that writes without end to its log. */
const line = Buffer.alloc(64 * 1024, 'warning ');
process.on('message', () => {
  const write = () => {
    while (process.stderr.write(line));
    process.stderr.once('drain', write);
  };
  write();
});
