// Bundles src/model/expression/grammar.ts with the few files of mathjs that it uses.
import { build } from 'esbuild';

const root = new URL('..', import.meta.url).pathname;

/** The bundled module as text. */
export async function bundleGrammar() {
  const result = await build({
    entryPoints: [`${root}src/model/expression/grammar.ts`],
    bundle: true,
    write: false,
    format: 'esm',
    platform: 'node',
    target: 'node20',
    legalComments: 'inline',
    logLevel: 'warning',
  });
  return result.outputFiles[0].text;
}

/** A plugin for the test runner: the same bundle in place of the source, made once per run. */
export function grammarPlugin() {
  let text;
  return {
    name: 'grammar',
    enforce: 'pre',
    load(id) {
      return id.endsWith('src/model/expression/grammar.ts') ? (text ??= bundleGrammar()) : null;
    },
  };
}
