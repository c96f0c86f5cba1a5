/**
 * The published JSON Schemas (A. Wright, H. Andrews, B. Hutton, G. Dennis, JSON Schema, draft 2020-12): one for
 * model files and one for results. They describe the layout for editors and other programs; the reader of model
 * files makes its own, more telling, checks and does not use them.
 */
import model from './model.schema.json' with { type: 'json' };
import result from './result.schema.json' with { type: 'json' };

/** A JSON Schema as plain data. */
export type JsonSchema = Readonly<Record<string, unknown>>;

export const modelSchema: JsonSchema = model;
export const resultSchema: JsonSchema = result;
