/** The rows of the table: tasks with the time they should stay below, in seconds, and who carries them out. */
import { fileURLToPath } from 'node:url';

const here = (name) => fileURLToPath(new URL(name, import.meta.url));
const own = (name) => ({ command: [process.execPath, here(`./own/${name}.mjs`)] });
const python = (name, kind, more = {}) => ({ kind, command: ['python3', here(`./peers/${name}.py`), kind], ...more });
const program = (...words) => [process.execPath, here('../../dist/cli/main.js'), ...words];
const bare = (task) => ({ kind: 'floor', wall: true, task, command: [process.execPath, '-e', '0'] });

/** The three-fold planar quartic, declared by options. */
const quartic = [
  ...['--group', 'dihedral:3', '--on', 'q1,q2', '--time-reversal', '--vary', 'mu', '--set', 'mu=0', '--set', 'a=1', '--set', 'b=1'],
  ...['--hamiltonian', '(p1^2+p2^2)/2 + mu/2*(q1^2+q2^2) + a*(q1^3-3*q1*q2^2) + b*(q1^2+q2^2)^2'],
];

export const rows = [
  {
    name: 'T1',
    tasks: { 'character tables, nine groups': 0.6, 'character table of H4': 0.25 },
    own: own('t1'),
    peers: [python('t1', 'best', { repeats: 3 })],
    note: 'exact with indicators; best: numpy, floating, regular action and simultaneous eigenvectors, no indicators',
  },
  {
    name: 'T2',
    tasks: { 'Molien series, six actions': 0.5 },
    own: own('t2'),
    peers: [python('t2', 'best', { repeats: 3 })],
    note: 'rational and to degree 30; best: numpy, floating, to degree 30 only',
  },
  {
    name: 'T3a',
    tasks: { 'invariants O_h R6 degree 8': 0.03, 'invariants D6 R12 degree 4': 0.03, 'invariants S5 R10 degree 6': 0.03 },
    own: own('t3a'),
    peers: [python('t3a', 'best')],
    note: 'best: orbit sums of monomials over the elements, in plain Python',
  },
  {
    name: 'T3b',
    tasks: { 'generators D3 2+2': 0.02, 'generators C4 2+2': 0.02, 'generators O_h 3+3': 0.15 },
    own: own('t3b'),
    peers: [],
  },
  {
    name: 'T4',
    tasks: { '60 masses: components, frequencies': 0.05 },
    own: own('t4'),
    peers: [python('t4', 'typical'), python('t4', 'best')],
    note: 'typical: numpy, dense eigenvalues of JS; best: numpy, dense eigenvalues of K alone; characters typed from a table in both',
  },
  {
    name: 'T5',
    tasks: { 'codimension D3 n=4': 0.01, 'codimension D6 n=12': 0.01, 'codimension O_h n=48': 0.01, 'codimension I_h n=72': 0.01 },
    own: own('t5'),
    peers: [python('t5', 'typical')],
    note: 'exact; typical: numpy ranks of the equations on all n² unknowns (n ≤ 12 only)',
  },
  {
    name: 'T6',
    tasks: { 'whole small job, wall': (floor) => 1.8 * floor },
    own: { command: program('report', ...quartic, '--latex', '-'), wall: true, task: 'whole small job, wall' },
    peers: [bare('whole small job, wall'), python('t6', 'best', { wall: true, task: 'whole small job, wall', repeats: 3 })],
    repeats: 11,
    note: 'typical column: bare Node; best: one sympy script, rings of polynomials',
  },
  {
    name: 'start',
    tasks: { '--help, wall': (floor) => 1.5 * floor + 0.06 },
    own: { command: program('--help'), wall: true, task: '--help, wall' },
    peers: [bare('--help, wall')],
    repeats: 11,
    note: 'typical column: bare Node',
  },
  {
    name: 'T7',
    tasks: { 'classify 10 000 matrices under D6': 0.15 },
    own: own('t7'),
    peers: [python('t7', 'typical', { repeats: 2 }), python('t7', 'best')],
    note: 'typical: numpy, one after the other; best: numpy, closed formulas on blocks',
  },
  {
    name: 'T8',
    tasks: { 'splitting lemma, numbers': 0.015, 'splitting lemma, three symbols': 0.1 },
    own: own('t8'),
    peers: [python('t8', 'best')],
    note: 'best: truncated power series with numpy, numbers only',
  },
  {
    name: 'samples',
    tasks: { 'codim three-resonator-ring, wall': 0.5, 'codim truncated-icosahedron, wall': 10 },
    own: own('samples'),
    peers: [],
    repeats: 2,
  },
];
