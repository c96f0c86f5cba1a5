/** Sentences about mistyped names, over the edit distance of the expression reader. */
import { nearest } from '../expression/nearest.ts';

export { nearest };

/** " Did you mean X?" or the empty text, to be appended to a sentence. */
export function didYouMean(word: string, known: Iterable<string>): string {
  const near = word.length > 64 ? undefined : nearest(word, [...known]);
  return near === undefined ? '' : ` Did you mean ${near}?`;
}

/** Names joined for a message, at most `limit` of them. */
export function listed(names: Iterable<string>, limit = 30): string {
  const all = [...names];
  return all.length <= limit ? all.join(', ') : `${all.slice(0, limit).join(', ')}, … (${all.length} in all)`;
}
