/** Work on a stream in parallel, with answers in the order of the questions and bounded memory. */

/** A promise with its ends in hand. */
function signal(): { readonly given: Promise<void>; readonly give: () => void } {
  let give = (): void => {};
  const given = new Promise<void>((resolve) => {
    give = resolve;
  });
  return { given, give };
}

/**
 * Hands each item to `answer` and each answer, in order and as soon as it can be, to `write`. At most `window`
 * items are under way or wait to be written. Rejects when `write` or `items` does, without waiting for more items.
 */
export async function inOrder<Item, Answer>(
  items: AsyncIterable<Item>,
  window: number,
  answer: (item: Item) => Promise<Answer>,
  write: (answer: Answer) => Promise<void>,
): Promise<void> {
  const queue: Promise<Answer>[] = [];
  let ended = false;
  let [added, taken] = [signal(), signal()];
  const writer = (async () => {
    for (;;) {
      const next = queue[0];
      if (next === undefined) {
        if (ended) return;
        await added.given;
        added = signal();
      } else {
        await write(await next);
        queue.shift();
        taken.give();
      }
    }
  })();
  const failed = writer.then(() => new Promise<never>(() => {}));
  failed.catch(() => {});
  const iterator = items[Symbol.asyncIterator]();
  for (;;) {
    const item = await Promise.race([iterator.next(), failed]);
    if (item.done === true) break;
    queue.push(answer(item.value));
    added.give();
    while (queue.length >= window) {
      taken = signal();
      await Promise.race([taken.given, failed]);
    }
  }
  ended = true;
  added.give();
  await writer;
}
