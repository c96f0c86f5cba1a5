/** The answer: one sentence before everything else, and the few facts that go with it. */
import { cite, type Headline, joined, type Line, math, type Section } from '../document.ts';
import { formula, relation } from '../mathematics/index.ts';
import type { ReportView } from '../view.ts';
import { components, count, inertia, inParameters, integer, motionSentence, partition } from './words.ts';

interface Fact {
  readonly name: string;
  readonly line: Line;
}

/** The headline of a study, by the strongest answer among its stages; null where there is nothing to answer. */
export function headlineOf(view: ReportView): Headline | null {
  const facts = factsOf(view);
  if (view.verdict !== undefined) {
    const { answer, parameters, because } = view.verdict;
    const tone = answer === 'generic' || answer === 'no event' ? 'yes' : answer === 'undecided' ? 'open' : 'no';
    const words = {
      generic: `Generic ${inParameters(parameters)}`,
      'not generic': `Not generic ${inParameters(parameters)}`,
      'no event': 'No zero event',
      undecided: 'Undecided',
    }[answer];
    return { answer: words, tone, sentence: because, facts };
  }
  if (view.commands.includes('check') && view.symmetry !== undefined && view.equilibrium !== undefined) {
    const holds = view.symmetry.holds && view.equilibrium.holds;
    return {
      answer: holds ? 'The declaration holds' : 'The declaration fails',
      tone: holds ? 'yes' : 'no',
      sentence: checkSentence(view),
      facts,
    };
  }
  return facts.length === 0 ? null : { answer: '', tone: 'plain', sentence: '', facts };
}

function checkSentence(view: ReportView): string {
  const point = view.equilibrium!.holds ? 'The point is an equilibrium' : 'The point is not an equilibrium';
  const failing = view.symmetry!.generators.filter((g) => !g.symplectic || !g.invariant || g.reason !== undefined).map((g) => g.name);
  if (view.symmetry!.generators.length === 0) return `${point}; no symmetry is declared.`;
  if (failing.length === 0 && view.group?.order === 0)
    return `${point}, but the generators make no finite group within the limit on its order.`;
  if (failing.length === 0) return `${point}, and every generator is a symmetry of H.`;
  return `${point}; ${count(failing.length, 'generator')} ${failing.length === 1 ? 'is' : 'are'} no symmetry of H: ${failing.join(', ')}.`;
}

function factsOf(view: ReportView): readonly Fact[] {
  const facts: Fact[] = [];
  const zero = view.zero;
  if (zero !== undefined && zero !== null) {
    const without = zero.codimensionWithoutSymmetry;
    facts.push({
      name: 'Codimension',
      line:
        zero.codimension === null
          ? ['not decided']
          : [
              integer(zero.codimension),
              ' with the declared symmetry',
              ...(without === null ? [] : [', ', integer(without), ' without any']),
            ],
    });
    facts.push({
      name: 'Kernel',
      line: [
        'dimension ',
        integer(zero.kernel),
        ...(zero.components === undefined || zero.components.length === 0 ? [] : [' in ', ...components(zero.components)]),
        '; Jordan blocks ',
        partition(zero.blocks),
      ],
    });
    facts.push({ name: 'Motion', line: [`${zero.motion}: ${motionSentence(zero.motion)}`] });
  }
  if (view.verdict !== undefined && view.verdict.versal !== null && zero !== null && zero !== undefined) {
    const vary = view.model?.vary ?? [];
    const names = joined(vary.map((name) => math(formula(name))));
    facts.push({
      name: 'Unfolding',
      line: view.verdict.versal
        ? ['the declared parameters (', ...names, ') unfold the event: the family is versal']
        : [
            'the declared parameters (',
            ...names,
            ') do not unfold the event',
            ...(view.verdict.versality === undefined ? [] : [`: ${view.verdict.versality}`]),
          ],
    });
  }
  if (view.inertia !== undefined) facts.push({ name: 'Inertia of S', line: [inertia(view.inertia), ' (positive, zero, negative)'] });
  if (view.neutral !== undefined && view.neutral.dimension > 0)
    facts.push({ name: 'Neutral part', line: [`dimension `, integer(view.neutral.dimension), ', split off before the event is judged'] });
  if (view.collisions !== undefined && view.collisions.length > 0)
    facts.push({ name: 'Collisions', line: [count(view.collisions.length, 'cluster'), ' off zero'] });
  if (view.stability !== undefined) facts.push({ name: 'Stability', line: [view.stability] });
  if (view.crossings !== undefined)
    facts.push({
      name: 'Zero events',
      line:
        view.crossings.length === 0
          ? ['none in the range']
          : joined(
              view.crossings.map((c) => math(relation(formula(c.parameter), c.exact === null ? '~' : '=', formula(c.exact ?? c.value)))),
              '; ',
            ),
    });
  if (view.group !== undefined) {
    const { order, reversing, name } = view.group;
    facts.push({
      name: 'Symmetry',
      line: [
        ...(name === undefined ? [] : [`${name}, `]),
        'order ',
        integer(order),
        ...(reversing > 0 ? [', of which ', integer(reversing), reversing === 1 ? ' reverses time' : ' reverse time'] : []),
      ],
    });
  }
  if (view.model !== undefined) {
    const values = Object.entries(view.model.parameters).filter(([, v]) => v !== null);
    if (values.length > 0)
      facts.push({ name: 'Parameters', line: joined(values.map(([name, v]) => math(relation(formula(name), '=', formula(v!))))) });
  }
  if (view.arithmetic !== undefined)
    facts.push({
      name: 'Arithmetic',
      line: [view.arithmetic, ...(view.floatingBecause === undefined ? [] : [`: ${view.floatingBecause}`])],
    });
  return facts;
}

/** The verdict in full: why, whether the parameters unfold it, and by which theorem. */
export function verdictSection(view: ReportView): Section | null {
  const verdict = view.verdict;
  if (verdict === undefined) return null;
  const rows: Fact[] = [
    { name: 'Answer', line: [verdict.answer] },
    { name: 'Parameters allowed', line: [integer(verdict.parameters)] },
  ];
  rows.push({ name: 'Versal', line: [verdict.versal === null ? 'nothing is varied' : verdict.versal ? 'yes' : 'no'] });
  if (verdict.versality !== undefined) rows.push({ name: 'Unfolding', line: [verdict.versality] });
  return {
    id: 'verdict',
    title: 'Verdict',
    blocks: [
      { kind: 'paragraph', line: [verdict.because] },
      { kind: 'facts', rows },
      {
        kind: 'paragraph',
        line: [
          'An event is generic in as many parameters as its codimension says, or more ',
          cite('arnold-1971', 'galin-1982', 'kocak-1984'),
          '; which zero events are generic in one parameter, and how their eigenvalues move, is known ',
          cite('golubitsky-stewart-1987', 'dellnitz-melbourne-marsden-1992'),
          '.',
        ],
        aside: true,
      },
    ],
  };
}
