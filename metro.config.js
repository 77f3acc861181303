const path = require('node:path');
const { getDefaultConfig } = require('expo/metro-config');
const { FileStore } = require('metro-cache');

/** @type {import('expo/metro-config').MetroConfig} */
const config = getDefaultConfig(__dirname);

// Keep the bundler (crawler, watcher, resolver) out of the folders that no client code may import.
const OUTSIDE = [
  'server',
  'workers',
  'tests',
  'fixtures',
  'scripts',
  'dist',
  '.data',
  'artifacts',
  'coverage',
];
const escaped = (text) => text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
const outside = OUTSIDE.map((folder) => new RegExp(`^${escaped(path.join(__dirname, folder))}(/|$)`));
const existing = config.resolver.blockList;
config.resolver.blockList = [
  ...(Array.isArray(existing) ? existing : existing ? [existing] : []),
  ...outside,
];

// Beside the packages instead of in the common temporary folder: there, two users of one machine would share it.
const cache = path.join(__dirname, 'node_modules/.cache/metro');
config.cacheStores = [new FileStore({ root: cache })];
config.fileMapCacheDirectory = cache;

// zod's index re-exports every locale and the way from JSON Schema, and Metro does not drop unused re-exports:
// of the locales English alone is kept, of the others nothing. The way to JSON Schema stays: minValue and maxValue of a
// number, which the bench's fields take their bounds from, are read through it.
const unusedOfZod = /(locales\/index|from-json-schema|core\/compile|\.\/compile)\.js$/;
// Likewise of react-native-web's index what neither we nor the router use: long lists, and controls that we have of our own.
const unusedOfWeb =
  /\/(FlatList|SectionList|VirtualizedList|VirtualizedSectionList|CheckBox|Switch|Picker|ProgressBar|Modal|TouchableHighlight|ImageBackground|KeyboardAvoidingView)(\/index(\.js)?)?$/;
const upstream = config.resolver.resolveRequest;
config.resolver.resolveRequest = (context, name, platform) => {
  if (unusedOfZod.test(name) && /[\\/]node_modules[\\/]zod[\\/]/.test(context.originModulePath)) {
    if (!name.endsWith('locales/index.js')) return { type: 'empty' };
    return { type: 'sourceFile', filePath: path.join(__dirname, 'shared/zod-locales.js') };
  }
  if (unusedOfWeb.test(name) && /[\\/]node_modules[\\/]react-native-web[\\/]/.test(context.originModulePath))
    return { type: 'empty' };
  return (upstream ?? context.resolveRequest)(context, name, platform);
};

module.exports = config;
