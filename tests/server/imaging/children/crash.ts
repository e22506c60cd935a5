/** A rendering process that dies, with a word in its log. */
process.on('message', () => {
  process.stderr.write('double free\n', () => process.kill(process.pid, 'SIGSEGV'));
});
