/**
 * ESLint rule: which folder may import which. Each ban says what to do instead.
 *
 * A file belongs to the longest zone that its path starts with; so does what it imports. Both `@/…` and relative
 * specifiers are understood; type imports count. Packages are checked by name against the zone's banned ones.
 */
const path = require('node:path');

const CLIENT_PACKAGES =
  /^(node:|express|sequelize|pg$|pg-|umzug|multer|argon2|nodemailer|pino|esbuild|socket\.io$)/;
const STACK_PACKAGES = /^(express|sequelize|pg$|pg-|umzug|socket\.io|react|expo|multer|nodemailer)/;
const ENGINE_PACKAGES = /^(node:|express|sequelize|pg|react|expo|socket\.io|apache-arrow|papaparse)/;
const CLIENT_ADVICE =
  'The client runs in a browser: what it needs from the server comes over the API, through a hook in hooks/; ' +
  'what both sides must agree on belongs in shared/.';

/** zone → the zones it may import besides itself, the packages it may not, and what to do instead. */
const ZONES = {
  app: {
    may: ['components', 'hooks', 'constants', 'assets', 'shared'],
    bans: CLIENT_PACKAGES,
    instead: CLIENT_ADVICE,
  },
  components: {
    may: ['hooks', 'constants', 'assets', 'shared'],
    bans: CLIENT_PACKAGES,
    instead: `A component takes what it shows as props or from a hook and knows no route of app/. ${CLIENT_ADVICE}`,
  },
  hooks: {
    may: ['constants', 'shared'],
    bans: CLIENT_PACKAGES,
    instead: `A hook returns data and draws nothing: move what is drawn to components/. ${CLIENT_ADVICE}`,
  },
  constants: {
    may: ['shared'],
    bans: CLIENT_PACKAGES,
    instead: 'Constants depend on nothing but shared/: move code that needs more to hooks/ or components/.',
  },
  server: {
    may: ['workers/index', 'workers/protocol', 'workers/pool', 'workers/store', 'fixtures', 'shared'],
    bans: /^(react|expo)/,
    instead:
      'The server hands numeric work to a worker process: submit a job through workers/index, and put what both ' +
      'must agree on into workers/protocol or shared/.',
  },
  workers: {
    may: ['shared', 'workers/engine', 'workers/index', 'workers/protocol', 'workers/pool', 'workers/store'],
    bans: STACK_PACKAGES,
    instead:
      'Workers know no database, no HTTP and no screen: pass what the job needs in its message (workers/protocol) ' +
      'or through the store.',
  },
  'workers/engine': {
    may: ['shared'],
    bans: ENGINE_PACKAGES,
    instead:
      'The engine is pure numerics without I/O: take plain columns and numbers as arguments and let workers/ read ' +
      'and write.',
  },
  fixtures: {
    may: ['shared'],
    bans: STACK_PACKAGES,
    instead: 'Fixtures describe scenarios with the contracts of shared/; workers/ make data out of them.',
  },
  shared: {
    may: [],
    bans: /^(node:|react|expo|express|sequelize|pg)/,
    instead:
      'shared/ imports no other folder: move the piece that is needed here, or the code that needs it away.',
  },
};
/** Public entries of workers/ are zones of their own, so that they can be named above; they obey workers' rules. */
const ENTRIES = ['workers/index', 'workers/protocol', 'workers/pool', 'workers/store'];
const NAMES = [...Object.keys(ZONES), ...ENTRIES, 'assets', 'scripts', 'tests'].sort(
  (a, b) => b.length - a.length,
);

const zoneOf = (file) =>
  NAMES.find((zone) => file === zone || file.startsWith(`${zone}/`) || file.startsWith(`${zone}.`));
const rulesOf = (zone) => ZONES[ENTRIES.includes(zone) ? 'workers' : zone];

/** Path of what is imported relative to the root, or undefined for a package. A bare folder means its index. */
function target(specifier, file) {
  if (!/^(@\/|\.)/.test(specifier)) return undefined;
  const imported = specifier.startsWith('@/')
    ? specifier.slice(2)
    : path.posix.join(path.posix.dirname(file), specifier);
  return imported === 'workers' ? 'workers/index' : imported;
}

/** What is wrong with importing `specifier` from `file` (relative to the root, with '/'), or undefined. */
function complaint(specifier, file) {
  const zone = zoneOf(file);
  const rules = zone && rulesOf(zone);
  if (!rules) return undefined;
  const imported = target(specifier, file);
  if (imported === undefined) {
    return rules.bans.test(specifier)
      ? `${zone}/ must not import the package "${specifier}". ${rules.instead}`
      : undefined;
  }
  const importedZone = zoneOf(imported);
  const isOwn = importedZone === zone || rulesOf(importedZone) === rules;
  if (isOwn || rules.may.includes(importedZone)) return undefined;
  return `${zone}/ must not import "${specifier}" (allowed: ${[zone, ...rules.may].join(', ')}). ${rules.instead}`;
}

/** @type {import('eslint').Rule.RuleModule} */
module.exports = {
  meta: {
    type: 'problem',
    docs: { description: 'keep the directions of imports between folders' },
    schema: [],
  },
  create(context) {
    const file = path.relative(context.cwd, context.filename).split(path.sep).join('/');
    const check = (source) => {
      if (!source || typeof source.value !== 'string') return;
      const message = complaint(source.value, file);
      if (message) context.report({ node: source, message });
    };
    return {
      ImportDeclaration: (node) => check(node.source),
      ExportAllDeclaration: (node) => check(node.source),
      ExportNamedDeclaration: (node) => check(node.source),
      ImportExpression: (node) => check(node.source),
      TSImportType: (node) => check(node.source),
      CallExpression: (node) => node.callee.name === 'require' && check(node.arguments[0]),
    };
  },
};
