import { defineConfig } from 'vitest/config';
import { grammarPlugin } from '../.build/grammar.mjs';

export default defineConfig({
  plugins: [grammarPlugin()],
  root: new URL('..', import.meta.url).pathname,
  test: { include: ['**/*.test.ts'], testTimeout: 60000 },
});
