import { characterTable, closeGroup } from '../../../dist/group/index.js';
import { done, expect, timed } from './clock.mjs';
import { groups } from './groups.mjs';

timed('character tables, nine groups', () => {
  for (const [name, order, generators] of groups) {
    const run = () => {
      const list = generators();
      const group = closeGroup(list, list[0].length);
      characterTable(group);
      expect(group.order, order, name);
    };
    if (name === 'H4') timed('character table of H4', run);
    else run();
  }
});
done();
