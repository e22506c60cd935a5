// What the benches of the reading run, built as the desk's worker is built.
export { createNetReader } from '#shared/compute/net-reader.ts';
export { prepareNet } from '#shared/compute/prepare-net.ts';
export { readNet } from '#shared/compute/read-net.ts';
export { readSetOut } from '#shared/compute/set-out.ts';
export { singleInputs } from '#shared/compute/single-inputs.ts';
