/** Typed errors that carry the culprits. */
export * from './errors.ts';
