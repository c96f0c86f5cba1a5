/** The whole program but for its streams: a command line in, an exit status out. */
import type { Outcome } from '../study/outcome.ts';
import { deliver } from './deliver.ts';
import { commandHelp, programHelp } from './help.ts';
import type { Invocation } from './invocation.ts';
import { messageOf } from './messages.ts';
import { parse } from './parse.ts';
import { bold, ClosedPipe, type World } from './world.ts';
import { wrapText } from './wrap.ts';

/** How commands are carried out; the real one loads the library, tests hand in another. */
export interface Runners {
  /** Commands with one outcome. */
  readonly answer: (invocation: Invocation, world: World) => Promise<Outcome>;
  /** Commands that write as they go or print a text of their own (batch, completions, man); their exit status. */
  readonly stream: (invocation: Invocation, world: World) => Promise<number>;
}

/** Widest help, on however wide a terminal. */
const WIDEST = 100;

const streaming: readonly string[] = ['batch', 'completions', 'man'];

/** Carries out a command line; never throws. */
export async function program(words: readonly string[], world: World, runners: Runners): Promise<number> {
  const colorful = !words.includes('--no-color');
  try {
    const parsed = parse(words);
    if (parsed.kind === 'version') {
      await world.write(`symcodim ${world.version()}\n`);
      return 0;
    }
    if (parsed.kind === 'help') {
      const bare = words.length === 0;
      const style = {
        width: Math.min(world.width ?? WIDEST, WIDEST),
        heading: (bare ? world.colorMessages : world.colorOutput) && colorful ? bold : (text: string) => text,
      };
      const text = parsed.command === undefined ? programHelp(style) : commandHelp(parsed.command, style);
      if (bare) world.tell(text);
      else await world.write(`${text}\n`);
      return bare ? 2 : 0;
    }
    const { invocation } = parsed;
    if (streaming.includes(invocation.command)) return await runners.stream(invocation, world);
    const outcome = await runners.answer(invocation, world);
    await deliver(outcome, invocation, world);
    return outcome.status;
  } catch (error) {
    if (error instanceof ClosedPipe) return 0;
    const { text, status } = messageOf(error, world.colorMessages && colorful, world.trace);
    world.tell(wrapText(text, world.width));
    return status;
  }
}
