/**
 * Character tables with Mulliken's labels and decompositions of the displacements of molecules: E. B. Wilson, J. C. Decius,
 * P. C. Cross, Molecular Vibrations (1955), appendix X; G. Herzberg, Infrared and Raman Spectra (1945); benzene E. B. Wilson,
 * Phys. Rev. 45 (1934) 706; C60 D. Weeks, W. Harter (1988/1989) (places from memory). Classes are given by words in the generators
 * of the catalogue, leftmost last to act.
 */

export interface PublishedTable {
  readonly classes: Readonly<Record<string, string>>;
  /** In the order of the classes. */
  readonly irreducibles: Readonly<Record<string, readonly number[]>>;
}

export const TABLES: Readonly<Record<string, PublishedTable>> = {
  C2v: {
    classes: { C2: 'r', E: '', 'sv(xz)': 'm', 'sv(yz)': 'rm' },
    irreducibles: {
      A1: [1, 1, 1, 1],
      A2: [1, 1, -1, -1],
      B1: [-1, 1, 1, -1],
      B2: [-1, 1, -1, 1],
    },
  },
  C3v: {
    classes: { C3: 'r', E: '', sv: 'm' },
    irreducibles: {
      A1: [1, 1, 1],
      A2: [1, 1, -1],
      E: [-1, 2, 0],
    },
  },
  Td: {
    classes: { C2: 'ff', C3: 'c', E: '', S4: 'f', sd: 'fcc' },
    irreducibles: {
      A1: [1, 1, 1, 1, 1],
      A2: [1, 1, 1, -1, -1],
      E: [2, -1, 2, 0, 0],
      T1: [-1, 0, 3, 1, -1],
      T2: [-1, 0, 3, -1, 1],
    },
  },
  D6h: {
    classes: {
      C2: 'rrr',
      "C2'": 'd',
      "C2''": 'rd',
      C3: 'rr',
      C6: 'r',
      E: '',
      iC2: 'h',
      "iC2'": 'hrrrd',
      "iC2''": 'hrrrrd',
      iC3: 'hrrrrr',
      iC6: 'hrrrr',
      iE: 'hrrr',
    },
    irreducibles: {
      A1g: [1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1],
      A1u: [1, 1, 1, 1, 1, 1, -1, -1, -1, -1, -1, -1],
      A2g: [1, -1, -1, 1, 1, 1, 1, -1, -1, 1, 1, 1],
      A2u: [1, -1, -1, 1, 1, 1, -1, 1, 1, -1, -1, -1],
      B1g: [-1, 1, -1, 1, -1, 1, -1, 1, -1, 1, -1, 1],
      B1u: [-1, 1, -1, 1, -1, 1, 1, -1, 1, -1, 1, -1],
      B2g: [-1, -1, 1, 1, -1, 1, -1, -1, 1, 1, -1, 1],
      B2u: [-1, -1, 1, 1, -1, 1, 1, 1, -1, -1, 1, -1],
      E1g: [-2, 0, 0, -1, 1, 2, -2, 0, 0, -1, 1, 2],
      E1u: [-2, 0, 0, -1, 1, 2, 2, 0, 0, 1, -1, -2],
      E2g: [2, 0, 0, -1, -1, 2, 2, 0, 0, -1, -1, 2],
      E2u: [2, 0, 0, -1, -1, 2, -2, 0, 0, 1, 1, -2],
    },
  },
  Oh: {
    classes: { C2: 'rr', "C2'": 'rc', C3: 'c', C4: 'r', E: '', iC2: 'irr', "iC2'": 'irc', iC3: 'ic', iC4: 'ir', iE: 'i' },
    irreducibles: {
      A1g: [1, 1, 1, 1, 1, 1, 1, 1, 1, 1],
      A1u: [1, 1, 1, 1, 1, -1, -1, -1, -1, -1],
      A2g: [1, -1, 1, -1, 1, 1, -1, 1, -1, 1],
      A2u: [1, -1, 1, -1, 1, -1, 1, -1, 1, -1],
      Eg: [2, 0, -1, 0, 2, 2, 0, -1, 0, 2],
      Eu: [2, 0, -1, 0, 2, -2, 0, 1, 0, -2],
      T1g: [-1, -1, 0, 1, 3, -1, -1, 0, 1, 3],
      T1u: [-1, -1, 0, 1, 3, 1, 1, 0, -1, -3],
      T2g: [-1, 1, 0, -1, 3, -1, 1, 0, -1, 3],
      T2u: [-1, 1, 0, -1, 3, 1, -1, 0, 1, -3],
    },
  },
  Ih: {
    classes: { C2: 'rc', C3: 'c', C5: 'r', 'C5^2': 'rr', E: '', iC2: 'irc', iC3: 'ic', iC5: 'ir', 'iC5^2': 'irr', iE: 'i' },
    irreducibles: {
      Ag: [1, 1, 1, 1, 1, 1, 1, 1, 1, 1],
      Au: [1, 1, 1, 1, 1, -1, -1, -1, -1, -1],
      T1g: [-1, 0, 1.61803398875, -0.61803398875, 3, -1, 0, 1.61803398875, -0.61803398875, 3],
      T1u: [-1, 0, 1.61803398875, -0.61803398875, 3, 1, 0, -1.61803398875, 0.61803398875, -3],
      T2g: [-1, 0, -0.61803398875, 1.61803398875, 3, -1, 0, -0.61803398875, 1.61803398875, 3],
      T2u: [-1, 0, -0.61803398875, 1.61803398875, 3, 1, 0, 0.61803398875, -1.61803398875, -3],
      Gg: [0, 1, -1, -1, 4, 0, 1, -1, -1, 4],
      Gu: [0, 1, -1, -1, 4, 0, -1, 1, 1, -4],
      Hg: [1, -1, 0, 0, 5, 1, -1, 0, 0, 5],
      Hu: [1, -1, 0, 0, 5, -1, 1, 0, 0, -5],
    },
  },
  D3h: {
    classes: { C3: 'r', E: '', hC3: 'hr', hE: 'h', hsv: 'd', sv: 'hd' },
    irreducibles: {
      "A1'": [1, 1, 1, 1, 1, 1],
      "A2'": [1, 1, 1, 1, -1, -1],
      "E'": [-1, 2, -1, 2, 0, 0],
      "A1''": [1, 1, -1, -1, 1, -1],
      "A2''": [1, 1, -1, -1, -1, 1],
      "E''": [-1, 2, 1, -2, 0, 0],
    },
  },
  D4h: {
    classes: { C2: 'rr', "C2'": 'd', "C2''": 'rd', C4: 'r', E: '', iC2: 'h', "iC2'": 'hrrd', "iC2''": 'hrrrd', iC4: 'hrrr', iE: 'hrr' },
    irreducibles: {
      A1g: [1, 1, 1, 1, 1, 1, 1, 1, 1, 1],
      A1u: [1, 1, 1, 1, 1, -1, -1, -1, -1, -1],
      A2g: [1, -1, -1, 1, 1, 1, -1, -1, 1, 1],
      A2u: [1, -1, -1, 1, 1, -1, 1, 1, -1, -1],
      B1g: [1, 1, -1, -1, 1, 1, 1, -1, -1, 1],
      B1u: [1, 1, -1, -1, 1, -1, -1, 1, 1, -1],
      B2g: [1, -1, 1, -1, 1, 1, -1, 1, -1, 1],
      B2u: [1, -1, 1, -1, 1, -1, 1, -1, 1, -1],
      Eg: [-2, 0, 0, 0, 2, -2, 0, 0, 0, 2],
      Eu: [-2, 0, 0, 0, 2, 2, 0, 0, 0, -2],
    },
  },
};

export interface PublishedMolecule {
  readonly name: string;
  readonly group: string;
  /** One atom of each orbit. */
  readonly seeds: readonly (readonly [number, number, number])[];
  readonly displacements: Readonly<Record<string, number>>;
}

export const MOLECULES: readonly PublishedMolecule[] = [
  {
    name: 'water H2O (molecule in yz plane)',
    group: 'C2v',
    seeds: [
      [0, 0, 0],
      [0, 1, -1],
    ],
    displacements: { A1: 3, A2: 1, B1: 2, B2: 3 },
  },
  {
    name: 'water H2O (molecule in xz plane)',
    group: 'C2v',
    seeds: [
      [0, 0, 0],
      [1, 0, -1],
    ],
    displacements: { A1: 3, A2: 1, B1: 3, B2: 2 },
  },
  {
    name: 'ammonia NH3',
    group: 'C3v',
    seeds: [
      [0, 0, 1],
      [1, 0, 0],
    ],
    displacements: { A1: 3, A2: 1, E: 4 },
  },
  {
    name: 'boron trifluoride BF3',
    group: 'D3h',
    seeds: [
      [0, 0, 0],
      [1, 0, 0],
    ],
    displacements: { "A1'": 1, "A2'": 1, "E'": 3, "A2''": 2, "E''": 1 },
  },
  {
    name: 'methane CH4',
    group: 'Td',
    seeds: [
      [0, 0, 0],
      [1, 1, 1],
    ],
    displacements: { A1: 1, E: 1, T1: 1, T2: 3 },
  },
  {
    name: 'white phosphorus P4',
    group: 'Td',
    seeds: [[1, 1, 1]],
    displacements: { A1: 1, E: 1, T1: 1, T2: 2 },
  },
  {
    name: 'square planar XeF4',
    group: 'D4h',
    seeds: [
      [0, 0, 0],
      [1, 0, 0],
    ],
    displacements: { A1g: 1, A2g: 1, A2u: 2, B1g: 1, B2g: 1, B2u: 1, Eg: 1, Eu: 3 },
  },
  {
    name: 'benzene C6H6',
    group: 'D6h',
    seeds: [
      [1, 0, 0],
      [2, 0, 0],
    ],
    displacements: { A1g: 2, A2g: 2, A2u: 2, B1u: 2, B2g: 2, B2u: 2, E1g: 2, E1u: 4, E2g: 4, E2u: 2 },
  },
  {
    name: 'sulfur hexafluoride SF6',
    group: 'Oh',
    seeds: [
      [0, 0, 0],
      [1, 0, 0],
    ],
    displacements: { A1g: 1, Eg: 1, T1g: 1, T1u: 3, T2g: 1, T2u: 1 },
  },
  {
    name: 'octahedron of 6 equal masses (B6 / no centre)',
    group: 'Oh',
    seeds: [[1, 0, 0]],
    displacements: { A1g: 1, Eg: 1, T1g: 1, T1u: 2, T2g: 1, T2u: 1 },
  },
  {
    name: 'cubane C8H8',
    group: 'Oh',
    seeds: [
      [1, 1, 1],
      [2, 2, 2],
    ],
    displacements: { A1g: 2, A2u: 2, Eg: 2, Eu: 2, T1g: 2, T1u: 4, T2g: 4, T2u: 2 },
  },
  {
    name: 'adamantane C10H16',
    group: 'Td',
    seeds: [
      [1, 1, 1],
      [2, 0, 0],
      [1.6, 1.6, 1.6],
      [2.6, 0.6, -0.6],
    ],
    displacements: { A1: 5, A2: 1, E: 6, T1: 8, T2: 12 },
  },
  {
    name: 'dodecahedrane C20H20',
    group: 'Ih',
    seeds: [
      [1, 1, 1],
      [2, 2, 2],
    ],
    displacements: { Ag: 2, T1g: 2, T1u: 4, T2g: 2, T2u: 4, Gg: 4, Gu: 4, Hg: 6, Hu: 4 },
  },
  {
    name: 'dodecahedron C20',
    group: 'Ih',
    seeds: [[1, 1, 1]],
    displacements: { Ag: 1, T1g: 1, T1u: 2, T2g: 1, T2u: 2, Gg: 2, Gu: 2, Hg: 3, Hu: 2 },
  },
  {
    name: 'icosahedron of 12 equal masses',
    group: 'Ih',
    seeds: [[0, 1, 1.618033988749895]],
    displacements: { Ag: 1, T1g: 1, T1u: 2, T2u: 1, Gg: 1, Gu: 1, Hg: 2, Hu: 1 },
  },
  {
    name: 'icosahedral borane B12H12^2-',
    group: 'Ih',
    seeds: [
      [0, 1, 1.618033988749895],
      [0, 2, 3.23606797749979],
    ],
    displacements: { Ag: 2, T1g: 2, T1u: 4, T2u: 2, Gg: 2, Gu: 2, Hg: 4, Hu: 2 },
  },
  {
    name: 'buckminsterfullerene C60',
    group: 'Ih',
    seeds: [[0, 1, 4.854101966249685]],
    displacements: { Ag: 2, Au: 1, T1g: 4, T1u: 5, T2g: 4, T2u: 5, Gg: 6, Gu: 6, Hg: 8, Hu: 7 },
  },
  {
    name: 'nickel tetracarbonyl Ni(CO)4',
    group: 'Td',
    seeds: [
      [0, 0, 0],
      [1, 1, 1],
      [2, 2, 2],
    ],
    displacements: { A1: 2, E: 2, T1: 2, T2: 5 },
  },
  {
    name: 'phosphorus(III) oxide P4O6',
    group: 'Td',
    seeds: [
      [1, 1, 1],
      [2, 0, 0],
    ],
    displacements: { A1: 2, E: 2, T1: 3, T2: 5 },
  },
  {
    name: 'neopentane C(CH3)4',
    group: 'Td',
    seeds: [
      [0, 0, 0],
      [1, 1, 1],
      [1.6, 1.6, 0.4],
    ],
    displacements: { A1: 3, A2: 1, E: 4, T1: 5, T2: 8 },
  },
];
