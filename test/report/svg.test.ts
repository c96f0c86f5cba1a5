import { describe, expect, it } from 'vitest';
import { renderSvg } from '../../src/report/index.ts';
import { drawFigure, type FigureData } from '../../src/report/svg/figure.ts';
import { sceneToSvg } from '../../src/report/svg/scene-svg.ts';
import { hostile } from './fixtures/large.ts';
import { ringAll, ringCheck, ringCodim } from './fixtures/ring.ts';
import { ringSweep } from './fixtures/sweep.ts';

/** Fails unless the text is a tree of elements with quoted attributes. */
function expectWellFormed(svg: string): void {
  const open: string[] = [];
  for (const [, close, name, attributes, empty] of svg.matchAll(/<(\/?)([a-z]+)((?:\s+[a-zA-Z:-]+="[^"<]*")*)\s*(\/?)>/g)) {
    if (close === '/') expect(open.pop()).toBe(name);
    else if (empty !== '/') open.push(name!);
    expect(attributes).not.toContain('NaN');
  }
  expect(open).toEqual([]);
  const bare = svg.replace(/<style>[^<]*<\/style>/, '').replace(/<\/?[a-z]+(?:\s+[a-zA-Z:-]+="[^"<]*")*\s*\/?>/g, '');
  expect(bare).not.toMatch(/[<>]|&(?!(amp|lt|gt|quot|#39);)/);
}

describe('pictures', () => {
  it('are well formed, alone and in a page', async () => {
    for (const results of [ringAll, ringSweep, hostile]) {
      const svg = (await renderSvg(results))!;
      expectWellFormed(svg);
      expect(svg).toMatch(/^<svg xmlns=/);
      expect(svg).not.toMatch(/href|url\(|<script|<image/);
    }
    expect(await renderSvg(ringCheck)).toBeNull();
  });

  it('of eigenvalues along a branch that turns back follow the branch, not the parameter', async () => {
    const there = [0, 0.5, 0.9].map((at) => ({ at, re: 0, im: Math.sqrt(1 - at) }));
    const back = [0.9, 0.5, 0].map((at) => ({ at, re: Math.sqrt(1 - at), im: 0 }));
    const scene = await drawFigure({
      kind: 'eigenvalues',
      parameter: 'v',
      paths: [{ component: 'A', points: [...there, ...back] }],
      events: [],
    });
    const lines = scene.shapes.flatMap((shape) =>
      shape.kind === 'path' && shape.title === 'A' ? [shape.points.map((point) => point[0])] : [],
    );
    const [frequency, rate] = lines;
    expect(frequency!.length).toBeGreaterThanOrEqual(3);
    for (const [xs, way] of [
      [frequency!, 1],
      [rate!, -1],
    ] as const)
      for (const [i, x] of xs.slice(1).entries()) expect(way * (x - xs[i]!)).toBeGreaterThanOrEqual(0);
  });

  it('of blocks: dimension over commuting algebra many equal squares for each component', async () => {
    const figure: FigureData = {
      kind: 'blocks',
      components: [
        { label: 'T1u', dimension: 3, type: 'real', multiplicity: 2 },
        { label: 'E1', dimension: 2, type: 'complex', multiplicity: 1 },
        { label: 'H', dimension: 4, type: 'quaternionic', multiplicity: 3 },
      ],
    };
    const scene = await drawFigure(figure);
    const squares = (words: string) => scene.shapes.filter((s) => s.kind === 'path' && s.title === words).length;
    expect(squares('T1u: 3 equal blocks of size 2')).toBe(3);
    expect(squares('E1: 1 block of size 2')).toBe(1);
    expect(squares('H: 1 block of size 12')).toBe(1);
    expect(scene.description).toContain('20 by 20');
  });

  it('of subgroups: one node each and one line for each cover', async () => {
    const svg = (await renderSvg({ ...ringCodim, components: [] }))!;
    expect(svg.match(/<title>\d+: codim \d<\/title>/g)).toHaveLength(10);
    expect(svg.match(/stroke="#8a8a8a" stroke-width="1" stroke-linejoin/g)).toHaveLength(17);
  });

  it('of eigenvalue paths: lines of different dash and colour, filled and open marks by sign', async () => {
    const svg = (await renderSvg(ringSweep))!;
    for (const color of ['#0072b2', '#d55e00', '#009e73']) expect(svg).toContain(`stroke="${color}"`);
    expect(svg).toContain('stroke-dasharray="6 3"');
    expect(svg).toContain('stroke-dasharray="2 2"');
    expect(svg).toMatch(/<circle[^>]*fill="#0072b2"/);
    expect(svg).toMatch(/<circle[^>]*fill="var\(--paper, #fff\)" stroke="#009e73"/);
    expect(svg).toContain('ω₀');
  });

  it('with nothing to show are still pictures', async () => {
    const empty: readonly FigureData[] = [
      { kind: 'blocks', components: [] },
      { kind: 'eigenvalues', parameter: 'c', paths: [] },
      { kind: 'bifurcation', parameter: 'c', amplitude: 'x', branches: [] },
      { kind: 'lattice', nodes: [], levelName: 'order', legend: { good: '', other: '', reversing: '', plain: '' } },
      {
        kind: 'chart',
        parameters: ['a', 'b'],
        ranges: [
          [0, 0],
          [1, 1],
        ],
        curves: [],
      },
      {
        kind: 'eigenvalues',
        parameter: 'c',
        paths: [
          {
            component: 'E',
            points: [
              { at: 0, re: 0, im: 0 },
              { at: Number.NaN, re: Number.POSITIVE_INFINITY, im: 1 },
            ],
          },
        ],
      },
    ];
    for (const figure of empty) expectWellFormed(await sceneToSvg(await drawFigure(figure), true));
  });
});
