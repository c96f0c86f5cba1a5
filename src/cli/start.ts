#!/usr/bin/env node
/**
 * Starts the program from its bundle, with V8's code cache for it where one fits. The cache is written by the
 * build for the Node and the processor at hand; V8 itself rejects one that does not fit, and the bundle is then
 * compiled as usual.
 */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import { Script } from 'node:vm';

const bundle = new URL('./program.cjs', import.meta.url);

function codeCache(): Buffer | undefined {
  try {
    return readFileSync(new URL(`./program-${process.version}-${process.arch}.cache`, import.meta.url));
  } catch {
    return undefined;
  }
}

const cachedData = codeCache();
const script = new Script(readFileSync(bundle, 'latin1'), {
  filename: fileURLToPath(bundle),
  ...(cachedData === undefined ? {} : { cachedData }),
});
(script.runInThisContext() as (require: NodeJS.Require, url: string) => void)(createRequire(bundle), bundle.href);
