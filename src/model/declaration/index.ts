/** From model files and options to one declaration: names, structure and texts, no arithmetic. */
export * from './declaration.ts';
export * from './model-file.ts';
export * from './names.ts';
export * from './nearest.ts';
export * from './options.ts';
export * from './text-file.ts';
export * from './texts.ts';
