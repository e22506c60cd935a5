/** A rendering process that never answers. */
process.on('message', () => undefined);
