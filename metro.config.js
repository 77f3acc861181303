const { getDefaultConfig } = require('expo/metro-config');
const path = require('path');

/** @type {import('expo/metro-config').MetroConfig} */
const config = getDefaultConfig(__dirname);

// Keep the bundler (crawler, watcher, resolver) out of the server-side folders.
const esc = (s) => s.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
const outside = ['server', 'workers', 'tests', 'fixtures', 'dist', '.data', 'coverage'].map(
  (d) => new RegExp('^' + esc(path.join(__dirname, d)) + '(/|$)'),
);
const existing = config.resolver.blockList;
config.resolver.blockList = [
  ...(Array.isArray(existing) ? existing : existing ? [existing] : []),
  ...outside,
];

// zod's index re-exports every locale and Metro does not drop unused re-exports: keep English only.
const upstream = config.resolver.resolveRequest;
config.resolver.resolveRequest = (context, name, platform) => {
  if (/locales\/index\.js$/.test(name) && /[\\/]node_modules[\\/]zod[\\/]/.test(context.originModulePath)) {
    return { type: 'sourceFile', filePath: path.join(__dirname, 'shared/zod-locales.js') };
  }
  return (upstream ?? context.resolveRequest)(context, name, platform);
};

module.exports = config;
