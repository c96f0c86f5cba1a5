/** The commands, one record each. */
import type { ArgumentRecord, CommandRecord } from './record.ts';

const model: ArgumentRecord = {
  name: 'MODEL',
  required: false,
  short: 'model file in YAML or JSON, or - for standard input; without it the model is declared by options',
  completion: 'file',
};

export const commands: readonly CommandRecord[] = [
  {
    name: 'check',
    argument: model,
    short: 'equilibrium, symplectic generators, invariance of H, order of the group',
    long: 'Tells whether the point is an equilibrium, whether each generator is symplectic or antisymplectic, whether H is invariant under each, and how large the group is. Where something fails, the offending term is named, and by how much. With --find it looks for the signed coordinate permutations that leave H invariant and compares them with what was declared.',
    examples: ['symcodim check samples/three-resonator-ring.yaml', 'symcodim check samples/three-resonator-ring.yaml --find'],
  },
  {
    name: 'components',
    argument: model,
    short: 'isotypic decomposition of the phase space, blocks of S and L, symmetry classes',
    long: 'Decomposes the phase space into isotypic components: real irreducibles with type and multiplicity, which of them carry an invariant skew form, the blocks of S and L in an adapted basis, and the symmetry class of each block. Parameters without a value stay symbols.',
    examples: ['symcodim components samples/three-resonator-ring.yaml --json'],
  },
  {
    name: 'codim',
    argument: model,
    short: 'the zero event: Jordan blocks, signature, passes or splits, codimension, verdict',
    long: 'Finds the generalised kernel of the linearisation and its Jordan blocks, tells whether the pair passes or splits, and gives the codimension with the declared symmetry, without any, and under every conjugacy class of subgroups. The verdict says whether as many parameters as the study may tune meet such an event generically.',
    examples: [
      'symcodim codim samples/three-resonator-ring.yaml',
      'symcodim codim --group cyclic:3 --on q1,p1 --quadratic "mu*(q1^2+p1^2)/2" --set mu=0 --vary mu',
      'symcodim codim --group dihedral:3 --on q1,q2 --time-reversal --hamiltonian "(p1^2+p2^2)/2 + a*(q1^3-3*q1*q2^2)" --set a=1',
    ],
  },
  {
    name: 'events',
    argument: model,
    short: 'every zero event that the action allows, up to a codimension; needs no H',
    long: 'Lists every zero event that the group and its action allow up to a codimension (2 unless --codimension says otherwise), one entry per signed type: kernel, Jordan blocks with signs, codimension, and whether the pair passes or splits.',
    examples: ['symcodim events --group dihedral:3 --on q1,q2 --codimension 2'],
  },
  {
    name: 'invariants',
    argument: model,
    short: 'Molien series, generators, equivariants, H rewritten in the invariants',
    long: 'Gives the Molien series as a rational function and as a series, generators of the invariant ring up to a degree, equivariants, and H rewritten in the invariants with its remainder, which is zero when H has the symmetry.',
    examples: ['symcodim invariants samples/three-resonator-ring.yaml --degree 4'],
  },
  {
    name: 'reduce',
    argument: model,
    short: 'reduced Hamiltonian on the kernel, nonlinear codimension, moduli, unfolding',
    long: 'Reduces the Hamiltonian to the kernel of S by the splitting lemma, writes it in the invariants of the group on the kernel, and gives the codimension of the germ, its moduli and an unfolding. With --elliptic it gives the Birkhoff normal form at an elliptic equilibrium instead.',
    examples: ['symcodim reduce samples/three-resonator-ring.yaml --degree 4'],
  },
  {
    name: 'branches',
    argument: model,
    short: 'isotropy subgroups and branches of equilibria, each confirmed on the full equations',
    long: 'Lists the isotropy subgroups on the kernel with their fixed spaces and the branches of equilibria: number of copies, side of the parameter, Morse index, stability. Each branch is confirmed by Newton on the full equations, or reported as not found.',
    examples: ['symcodim branches samples/three-resonator-ring.yaml'],
  },
  {
    name: 'sweep',
    argument: model,
    short: 'along a parameter: where blocks meet zero or collide, and what happens there',
    long: 'Follows the equilibrium along one parameter and locates every zero event and collision, in closed form where there is one, with the motion observed, the inertia and signature on both sides, and a picture.',
    examples: ['symcodim sweep samples/three-resonator-ring.yaml --range c=-1:1 --svg frequencies.svg'],
  },
  {
    name: 'report',
    argument: model,
    short: 'all of it as one LaTeX, HTML, Markdown or JSON document',
    long: 'Carries out the whole study and writes it as one document. Without a format it prints Markdown.',
    examples: [
      'symcodim report samples/three-resonator-ring.yaml --latex ring.tex',
      'symcodim report samples/three-resonator-ring.yaml --html ring.html',
    ],
  },
  {
    name: 'verify',
    argument: { name: 'RESULT', required: true, short: 'a result file in JSON, or - for standard input', completion: 'file' },
    short: 're-checks a result file by an independent route',
    long: 'Reads a result that --json wrote and checks every number of it by other routes than those that made it: orders by orbits, Jordan blocks by ranks modulo other primes, codimensions by brute force where the space is small, and a new study of the model that the file carries. Exit status 1 names each number that disagrees.',
    examples: ['symcodim codim samples/three-resonator-ring.yaml --json > ring.json && symcodim verify ring.json'],
  },
  {
    name: 'groups',
    argument: {
      name: 'NAME',
      required: false,
      short: 'catalogue name, such as dihedral:3, Oh or dihedral:3*reflection',
      completion: 'group',
    },
    short: 'the catalogue of groups; one group with its generators, classes, characters',
    long: 'Without a name, lists the catalogue. With one, prints its generators and matrix actions, conjugacy classes and character table.',
    examples: ['symcodim groups', 'symcodim groups dihedral:5'],
  },
  {
    name: 'batch',
    argument: { ...model, short: 'model file to which each line gives parameter values; without it each line is a model' },
    short: 'many models or parameter points as JSON lines, answers as JSON lines in order',
    long: 'Reads JSON lines on standard input and writes one result per line, in order, on all cores. With MODEL each line holds values of parameters, such as {"c": "-1/3"}; without it each line is a model in the form of a model file. A line that cannot be answered gives a line with status 2 and the error; the rest goes on. Every answer carries the number of its line and the status that the command would have had.',
    examples: [
      'symcodim batch samples/three-resonator-ring.yaml --command codim < points.jsonl > answers.jsonl',
      'parallel --pipe symcodim batch < models.jsonl',
    ],
  },
  {
    name: 'completions',
    argument: { name: 'SHELL', required: true, short: 'the shell', choices: ['bash', 'zsh', 'fish'] },
    short: 'completion script for bash, zsh or fish',
    long: 'Prints a completion script for the shell named.',
    examples: [
      'symcodim completions bash > ~/.local/share/bash-completion/completions/symcodim',
      'symcodim completions fish > ~/.config/fish/completions/symcodim.fish',
    ],
  },
  {
    name: 'man',
    short: 'the manual page',
    long: 'Prints the manual page in the man macros of troff; with --markdown it writes the table of commands and options that the README holds.',
    examples: ['symcodim man | man -l -'],
  },
];
