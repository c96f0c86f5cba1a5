/** The published sources that documents and comments refer to, by key. */

export interface Reference {
  readonly authors: string;
  readonly title: string;
  /** Journal with volume, or publisher. */
  readonly where: string;
  readonly year: number;
}

export const REFERENCES = {
  'arnold-1971': {
    authors: 'V. I. Arnold',
    title: 'On matrices depending on parameters',
    where: 'Russian Mathematical Surveys 26',
    year: 1971,
  },
  'collingwood-mcgovern-1993': {
    authors: 'D. H. Collingwood, W. M. McGovern',
    title: 'Nilpotent Orbits in Semisimple Lie Algebras',
    where: 'Van Nostrand Reinhold',
    year: 1993,
  },
  'dellnitz-melbourne-marsden-1992': {
    authors: 'M. Dellnitz, I. Melbourne, J. E. Marsden',
    title: 'Generic bifurcation of Hamiltonian vector fields with symmetry',
    where: 'Nonlinearity 5',
    year: 1992,
  },
  'galin-1982': {
    authors: 'D. M. Galin',
    title: 'Versal deformations of linear Hamiltonian systems',
    where: 'AMS Translations (2) 118 (Russian original 1975)',
    year: 1982,
  },
  'golubitsky-stewart-1987': {
    authors: 'M. Golubitsky, I. Stewart',
    title: 'Generic bifurcation of Hamiltonian systems with symmetry',
    where: 'Physica D 24',
    year: 1987,
  },
  'golubitsky-stewart-schaeffer-1988': {
    authors: 'M. Golubitsky, I. Stewart, D. G. Schaeffer',
    title: 'Singularities and Groups in Bifurcation Theory II',
    where: 'Springer',
    year: 1988,
  },
  'hoveijn-lamb-roberts-2003': {
    authors: 'I. Hoveijn, J. S. W. Lamb, R. M. Roberts',
    title: 'Normal forms and unfoldings of linear systems in eigenspaces of (anti)-automorphisms of order two',
    where: 'Journal of Differential Equations 190',
    year: 2003,
  },
  'kocak-1984': {
    authors: 'H. Koçak',
    title: 'Normal forms and versal deformations of linear Hamiltonian systems',
    where: 'Journal of Differential Equations 51',
    year: 1984,
  },
  'melbourne-dellnitz-1993': {
    authors: 'I. Melbourne, M. Dellnitz',
    title: 'Normal forms for linear Hamiltonian vector fields commuting with the action of a compact Lie group',
    where: 'Mathematical Proceedings of the Cambridge Philosophical Society 114',
    year: 1993,
  },
  'meyer-hall-offin-2009': {
    authors: 'K. R. Meyer, G. R. Hall, D. Offin',
    title: 'Introduction to Hamiltonian Dynamical Systems and the N-Body Problem',
    where: 'Springer',
    year: 2009,
  },
  'stanley-1979': {
    authors: 'R. P. Stanley',
    title: 'Invariants of finite groups and their applications to combinatorics',
    where: 'Bulletin of the American Mathematical Society 1',
    year: 1979,
  },
} as const satisfies Readonly<Record<string, Reference>>;

export type ReferenceKey = keyof typeof REFERENCES;

/** The entry of a key, or undefined where there is none. */
export function referenceOf(key: string): Reference | undefined {
  return Object.hasOwn(REFERENCES, key) ? REFERENCES[key as ReferenceKey] : undefined;
}

/** An entry in one line. */
export function referenceText(reference: Reference): string {
  return `${reference.authors}: ${reference.title}. ${reference.where}, ${reference.year}.`;
}
