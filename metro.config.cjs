const path = require('node:path');
const { getDefaultConfig } = require('expo/metro-config');

const config = getDefaultConfig(__dirname);

// zod re-exports every locale from its root and Metro cannot shake `export * as`: keep English only (97 KB less over the wire).
const zodLocales = /node_modules\/zod\/v4\/locales\/index\.c?js$/;
const englishOnly = path.join(__dirname, 'shared/zod-locales.js');
const inherited = config.resolver.resolveRequest;
config.resolver.resolveRequest = (context, name, platform) => {
  const found = (inherited ?? context.resolveRequest)(context, name, platform);
  return found.type === 'sourceFile' && zodLocales.test(found.filePath)
    ? { type: 'sourceFile', filePath: englishOnly }
    : found;
};

module.exports = config;
