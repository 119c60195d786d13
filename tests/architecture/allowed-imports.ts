/**
 * The law of imports: for each room (a folder, or a single file where it stands out), what it may import.
 *
 * The most particular entry counts: a file's own entry before its folder's, a folder's before its parent's. A room may
 * always import from itself. Dependencies point one way: from faces down to values in the add-in, from `solve` down to
 * `numerics` in the solver core; the core sees nothing of the add-in.
 */

export interface Room {
  /** Folder or file, from the top of the checkout, `/` between. */
  readonly path: string;
  /** Folders it may import values and types from. */
  readonly mayImport: readonly string[];
  /** Folders it may import types from, and nothing that exists at run time. */
  readonly mayImportTypesOf?: readonly string[];
  /** Packages of npm. */
  readonly packages?: readonly string[];
  /** Whether it may import Node's own modules (`node:…`). */
  readonly mayUseNode?: boolean;
}

/** The name by which the add-in reaches the solver core: its only door. */
export const coreDoor = '#solver-core';

const core = (...rooms: string[]): string[] => rooms.map((room) => `solver-core/${room}`);
const addin = (...rooms: string[]): string[] => rooms.map((room) => `addin/${room}`);

const corePlainRooms = ['numerics', 'control', 'sparse'];
const coreProblemRooms = [...corePlainRooms, 'linear-program'];
const coreSimplexRooms = [...coreProblemRooms, 'factorization', 'simplex'];

const solverCoreRooms: readonly Room[] = [
  { path: 'solver-core/numerics', mayImport: [] },
  { path: 'solver-core/control', mayImport: [] },
  { path: 'solver-core/sparse', mayImport: core('numerics', 'control') },
  { path: 'solver-core/linear-program', mayImport: core(...corePlainRooms) },
  { path: 'solver-core/factorization', mayImport: core(...corePlainRooms) },
  { path: 'solver-core/scaling', mayImport: core(...coreProblemRooms) },
  { path: 'solver-core/presolve', mayImport: core(...coreProblemRooms) },
  { path: 'solver-core/verification', mayImport: core(...coreProblemRooms) },
  { path: 'solver-core/certificate', mayImport: core(...coreProblemRooms) },
  { path: 'solver-core/formats', mayImport: core(...coreProblemRooms) },
  { path: 'solver-core/simplex', mayImport: core(...coreProblemRooms, 'factorization') },
  { path: 'solver-core/branch-and-bound', mayImport: core(...coreSimplexRooms, 'verification') },
  { path: 'solver-core/sensitivity', mayImport: core(...coreSimplexRooms) },
  { path: 'solver-core/infeasibility', mayImport: core(...coreSimplexRooms) },
  {
    path: 'solver-core/solve',
    mayImport: core(
      ...coreSimplexRooms,
      'scaling',
      'presolve',
      'verification',
      'certificate',
      'branch-and-bound',
      'sensitivity',
      'infeasibility',
    ),
  },
  { path: 'solver-core/index.ts', mayImport: ['solver-core'] },
];

const domainRooms: readonly Room[] = [
  { path: 'addin/domain/sheet', mayImport: [] },
  { path: 'addin/domain/formula', mayImport: addin('domain/sheet'), packages: ['@borgar/fx'] },
  {
    path: 'addin/domain/calculation',
    mayImport: addin('domain/sheet', 'domain/formula'),
    packages: ['numfmt'],
  },
  {
    path: 'addin/domain/linearization',
    mayImport: addin('domain/sheet', 'domain/formula', 'domain/calculation'),
  },
  {
    path: 'addin/domain/model-from-sheet',
    mayImport: [
      ...addin('domain/sheet', 'domain/formula', 'domain/calculation', 'domain/linearization'),
      coreDoor,
    ],
  },
  {
    path: 'addin/domain/results-to-sheet',
    mayImport: addin(
      'domain/sheet',
      'domain/formula',
      'domain/calculation',
      'domain/linearization',
      'domain/model-from-sheet',
    ),
    mayImportTypesOf: [coreDoor],
  },
  {
    path: 'addin/domain/statement-to-sheet',
    mayImport: addin('domain/sheet', 'domain/formula', 'domain/model-from-sheet', 'domain/results-to-sheet'),
  },
];

const faceRooms = addin('use-cases', 'ports', 'domain', 'wording');

const addinRooms: readonly Room[] = [
  ...domainRooms,
  { path: 'addin/ports', mayImport: addin('domain'), mayImportTypesOf: [coreDoor] },
  { path: 'addin/use-cases', mayImport: addin('domain', 'ports'), mayImportTypesOf: [coreDoor] },
  { path: 'addin/wording', mayImport: addin('domain'), mayImportTypesOf: [coreDoor] },
  // Adapters never import each other: each is its own entry, and none lists another.
  { path: 'addin/adapters/excel-host', mayImport: addin('ports', 'domain') },
  {
    path: 'addin/adapters/xlsx-file',
    mayImport: addin('ports', 'domain'),
    packages: ['@zip.js/zip.js', 'saxes', '@borgar/fx'],
  },
  {
    path: 'addin/adapters/xlsx-file/file-on-disk.ts',
    mayImport: addin('adapters/xlsx-file', 'ports', 'domain'),
    mayUseNode: true,
  },
  { path: 'addin/adapters/memory', mayImport: addin('ports', 'domain') },
  { path: 'addin/adapters/solver-thread', mayImport: [...addin('ports', 'domain', 'worker'), coreDoor] },
  { path: 'addin/worker', mayImport: [...addin('domain', 'wording'), coreDoor] },
  // Faces reach adapters through ports; only their composition roots, below, construct one.
  {
    path: 'addin/pane',
    mayImport: faceRooms,
    mayImportTypesOf: [coreDoor],
    packages: ['react', 'react-dom', '@fluentui/react-components'],
  },
  { path: 'addin/commands', mayImport: faceRooms },
  {
    path: 'addin/command-line',
    mayImport: [...faceRooms, coreDoor],
    packages: ['commander'],
    mayUseNode: true,
  },
  { path: 'addin/local-page', mayImport: faceRooms },
  {
    path: 'addin/samples',
    mayImport: addin('domain'),
    packages: ['@zip.js/zip.js'],
    mayUseNode: true,
  },
];

/** The files that construct adapters and hand them to use-cases: one a face. */
export const compositionRoots: readonly string[] = [
  'addin/command-line/planrow.ts',
  'addin/pane/main.ts',
  'addin/commands/ribbon-commands.ts',
  'addin/local-page/page.ts',
];

/** A composition root may do what its face may, and import adapters besides. */
function compositionRoot(path: string): Room {
  const face = addinRooms.find((room) => path.startsWith(`${room.path}/`));
  if (face === undefined) {
    throw new Error(`${path} stands in no face.`);
  }
  return { ...face, path, mayImport: [...face.mayImport, face.path, 'addin/adapters', coreDoor] };
}

export const rooms: readonly Room[] = [
  ...solverCoreRooms,
  ...addinRooms,
  ...compositionRoots.map(compositionRoot),
];
