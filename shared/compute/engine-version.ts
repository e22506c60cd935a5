/**
 * Version of the computation, frozen with every revision. Raise it with each change that can alter a figure, so that
 * a difference between two revisions can be put down to the engine or to the net.
 */
export const ENGINE_VERSION = '3';
