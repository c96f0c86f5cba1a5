/** Seconds of a task on its first call, by name; the last line of output is what the table reads. */
const seconds = {};

export function timed(name, task) {
  const start = performance.now();
  const result = task();
  seconds[name] = (performance.now() - start) / 1000;
  return result;
}

export function expect(found, wanted, what) {
  if (found !== wanted) throw new Error(`${what}: ${found}, not ${wanted}`);
}

export function done() {
  process.stdout.write(`${JSON.stringify(seconds)}\n`);
}
