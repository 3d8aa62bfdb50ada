// Who may import what. Each entry is the whole list of one folder: ESLint does not merge the lists of two entries that
// match the same file, the later one alone counts, so every list is built here and general entries stand first.

/** However many steps up a path goes, it must not come down in another package of the repository. */
const ESCAPE = {
  regex: '^(?:\\.\\.?/)+(?:server|shared|projects|test)/',
  message: 'Packages do not reach into each other by path; write @foldwright/shared/… or leave it.',
};

/** Kept for tests in every folder, beside what their folder may import. */
const FOR_TESTS = ['@jest/globals$', 'fast-check$', 'node:', '@angular/'];
const TESTS = ['test', 'spec', 'bench'];

/**
 * One row of the table.
 * @param {string[]} files globs
 * @param {string[]} allowed beginnings of paths, as regular expressions; everything else is refused
 * @param {string} why said when something is refused
 * @param {{regex: string, message: string}[]} [more.refused] exceptions from what is allowed
 * @param {string[]} [more.forTests] what tests may import besides
 */
function row(files, allowed, why, { refused = [], forTests = [] } = {}) {
  const rules = (list) => ({
    'no-restricted-imports': [
      'error',
      { patterns: [{ regex: `^(?!${list.join('|')})`, message: why }, ...refused, ESCAPE] },
    ],
  });
  const tests = files.flatMap((glob) => TESTS.map((kind) => glob.replace(/\*\.ts$/, `*.${kind}.ts`)));
  return [
    { files, rules: rules(allowed) },
    { files: tests, rules: rules([...allowed, ...FOR_TESTS, ...forTests]) },
  ];
}

const DEEPEST = 3;
const packageNames = (names) => names.map((name) => `${name}(?:$|/)`);
const SHARED = '@foldwright/shared/';

/** Globs for the files exactly so many folders below a folder. */
const atDepth = (folder, depth) => [`${folder}/${'*/'.repeat(depth)}*.ts`];
/** The folder itself, seen from so many folders below it. */
const within = (depth) => ['\\./(?!\\.)', ...(depth > 0 ? [`(?:\\.\\./){1,${depth}}(?!\\.)`] : [])];
/** Neighbours of the folder, seen from so many folders below it. */
const beside = (depth, names) => (names.length > 0 ? [`(?:\\.\\./){${depth + 1}}(?:${names.join('|')})/`] : []);

/** A row for a folder that may import itself, some of its neighbours and some packages. */
function folderRow(folder, { neighbours = [], others = [], testNeighbours = [], why }) {
  const rows = Array.from({ length: DEEPEST + 1 }, (_, depth) =>
    row(atDepth(folder, depth), [...within(depth), ...beside(depth, neighbours), ...others], why, {
      forTests: beside(depth, testNeighbours),
    }),
  ).flat();
  const forTests = [...within(1), ...beside(1, [...neighbours, ...testNeighbours]), ...others, ...FOR_TESTS];
  return [...rows, ...row([`${folder}/testing/*.ts`], forTests, why)];
}

/* shared: layers, each of which sees only those before it */

const LAYERS = [
  'units',
  'geometry',
  'fitting',
  'stock',
  'bending',
  'solid',
  'brake',
  'template',
  'nicks',
  'spread',
  'assembly',
  'part',
];
const UPPER = ['rules', 'drawing', 'pricing'];
const SHARED_PACKAGES = {
  geometry: packageNames(['robust-predicates', 'earcut', 'clipper2-ts', 'flatbush']),
  contracts: ['zod/mini$'],
};

function sharedRow(layer, below) {
  const packages = SHARED_PACKAGES[layer] ?? [];
  const list = below.length > 0 ? below.join(', ') : 'nothing else';
  const why =
    `shared/${layer} may import itself, ${list}${packages.length > 0 ? ' and its own packages' : ''}: ` +
    'the kernel is layered so that a part of it can be understood and tested without the ones above.';
  // A test may look at its layer from above: through the schema that guards it, or what is drawn from it.
  const testNeighbours = [...LAYERS, ...UPPER, 'contracts'];
  return folderRow(`shared/src/${layer}`, { neighbours: below, others: packages, testNeighbours, why });
}

const sharedRows = [
  ...LAYERS.flatMap((layer, index) => sharedRow(layer, LAYERS.slice(0, index))),
  ...UPPER.flatMap((layer) => sharedRow(layer, LAYERS)),
  ...sharedRow('contracts', [...LAYERS, ...UPPER]),
];

/* server */

const DATABASE = packageNames(['sequelize', 'umzug', 'pg', 'pg-boss', 'connect-pg-simple']);
const WEB = packageNames([
  'express',
  'express-session',
  'helmet',
  'multer',
  'passport',
  'passport-local',
  'rate-limiter-flexible',
]);
const BYTES = packageNames(['dxf-writer', 'makerjs', 'pdfkit', 'sharp', 'zod']);
const OUTSIDE = packageNames(['nodemailer', 'stripe', 'pino', 'zod']);
const NODE = 'node:';
const INSIDE = ['\\./', '(?:\\.\\./)+'];
const EVERYTHING = [SHARED, NODE, ...INSIDE, ...DATABASE, ...WEB, ...BYTES, ...OUTSIDE];

const NO_MODELS = {
  regex: '^(?:\\.\\./)+(?:models|migrations|database)/|^(?:sequelize|pg|pg-boss|umzug)(?:$|/)',
  message: 'Rows are the business of services: a route parses, calls one service and presents what it returns.',
};
/** Of what has to do with requests, services know only the values: who asks, what went wrong, which file is the answer. */
const NO_WEB = {
  regex:
    '^(?:\\.\\./)+(?:routes/|http/(?!(?:problem|visitor|file-answer|uploaded-file)$))|^(?:express|passport)(?:$|/|-)',
  message: 'A service knows nothing of requests, so that jobs and tests can call it too.',
};

/** Who sends a request: a plain value, though requests bring it. */
const VISITOR = '\\.\\./http/visitor$';
/** What rows mean once they are read: names for ids, documents brought up to date. */
const READINGS = '\\.\\./services/(?:names-of-people|stored-document)$';

const serverRows = [
  ...row(['server/src/**/*.ts'], EVERYTHING, 'The server may import itself, the shared kernel and its own packages.'),
  ...row(['server/src/routes/**/*.ts'], EVERYTHING, 'Routes may import the server’s own folders.', {
    refused: [NO_MODELS],
  }),
  ...row(['server/src/services/**/*.ts'], EVERYTHING, 'Services may import the server’s own folders.', {
    refused: [NO_WEB],
  }),
  ...row(['server/src/jobs/**/*.ts'], EVERYTHING, 'Jobs may import the server’s own folders.', { refused: [NO_WEB] }),
  ...folderRow('server/src/policies', {
    others: [SHARED, VISITOR],
    why: 'Policies are pure: who may do what follows from the person, the action and the row alone.',
  }),
  ...folderRow('server/src/presenters', {
    neighbours: ['models'],
    others: [SHARED, VISITOR, READINGS, 'zod/mini$'],
    why: 'Presenters turn rows into what the contract says, and do nothing else.',
  }),
  ...folderRow('server/src/migrations', {
    others: [NODE, ...DATABASE],
    why: 'A migration is frozen: it must mean the same when models and services have moved on.',
  }),
  ...folderRow('server/src/documents', {
    neighbours: ['vision'],
    others: [SHARED, NODE, ...BYTES],
    why: 'Documents are made from plans to bytes; the command line makes them without a database.',
  }),
  ...folderRow('server/src/vision', {
    others: [SHARED, NODE, ...BYTES],
    why: 'Photos are read without a database: the command line and the worker threads use this folder as it is.',
  }),
  ...folderRow('server/src/step', {
    others: [SHARED, NODE, ...packageNames(['replicad-opencascadejs', 'zod'])],
    why: 'Only this folder knows the solid modeller, so that another build of it can take its place.',
  }),
  ...folderRow('server/src/cli', {
    neighbours: ['vision', 'documents'],
    others: [SHARED, NODE],
    why: 'The command line runs without a database: it may import the kernel, vision and documents.',
  }),
  ...folderRow('server/src/fakes', {
    others: [NODE, ...packageNames(['express', 'smtp-server', 'zod'])],
    why: 'A stand-in has its own opinion and its own prices: sharing code with the product would only prove the code equal to itself.',
  }),
];

/* projects */

const BROWSER = [SHARED, '@angular/', 'rxjs(?:$|/)', '@mdi/js$'];
const UI = '@foldwright/ui/';
const APP = 'projects/foldwright/src/app';
/** The steps of the open part. Folders of `part` that are not named here belong to all of them. */
const PART_FEATURES = [
  'mock-up',
  'outline',
  'bends',
  'formed',
  'checks',
  'full-size-print',
  'release',
  'order',
  'fit-log',
];
/** Folders of a feature that hold plain TypeScript: a gesture can be tested there without a page. */
const PLAIN_FOLDERS = ['tools', 'snapping', 'hit-testing', 'geometry'];

const WHY_FEATURE =
  'A feature may import itself, the feature it belongs to, api, ui and the shared kernel, never a neighbour: ' +
  'deleting a feature is deleting a folder.';

/** The only folder of the application that talks to the server, and so the only one that judges what comes back. */
const API = folderRow(`${APP}/api`, {
  others: [...BROWSER, 'zod/mini$'],
  why: 'Requests know nothing of the features that make them.',
});

const featureDepths = Array.from({ length: DEEPEST + 1 }, (_, depth) => depth);

const projectRows = [
  ...row(['projects/**/*.ts'], [...BROWSER, UI, ...INSIDE], 'The application runs in a browser.'),
  ...folderRow('projects/ui/src', {
    others: [...BROWSER, 'three(?:$|/)'],
    why: 'The parts of the user interface know nothing of the application: they are given values and say what happened.',
  }),
  ...featureDepths.flatMap((depth) =>
    row(atDepth(`${APP}/*`, depth), [...BROWSER, UI, ...within(depth), ...beside(depth, ['api'])], WHY_FEATURE),
  ),
  ...API,
  ...row(['projects/*/jest-setup.ts'], ['jest-preset-angular/'], 'This file only prepares the tests.'),
  ...PART_FEATURES.flatMap((feature) =>
    featureDepths.flatMap((depth) => {
      const siblings = PART_FEATURES.filter((other) => other !== feature).join('|');
      const parent = `(?:\\.\\./){${depth + 1}}(?!\\.|(?:${siblings})/)`;
      return row(
        atDepth(`${APP}/part/${feature}`, depth),
        [...BROWSER, UI, ...within(depth), parent, ...beside(depth + 1, ['api'])],
        WHY_FEATURE,
      );
    }),
  ),
  ...PLAIN_FOLDERS.flatMap((folder) =>
    row(
      [`${APP}/part/*/${folder}/**/*.ts`],
      [SHARED, '\\./', '(?:\\.\\./){1,2}(?!\\.)'],
      'Tools, snapping and hit-testing are plain TypeScript without Angular, so that every gesture is a table test.',
    ),
  ),
];

const everywhere = { files: ['**/*.ts'], rules: { 'no-restricted-imports': ['error', { patterns: [ESCAPE] }] } };

/** The dependency table as entries for ESLint. */
export const boundaries = [everywhere, ...sharedRows, ...serverRows, ...projectRows];
