/** A rendering process that answers with what it can see of the server's environment. */
process.on('message', ({ id }: { id: number }) => {
  process.send?.({ id, kind: 'refused', refusal: { code: 'damaged', message: JSON.stringify(process.env) } });
});
