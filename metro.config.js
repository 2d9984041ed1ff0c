const path = require('node:path');
const { getDefaultConfig } = require('expo/metro-config');

const config = getDefaultConfig(__dirname);
const zodFolder = path.join('node_modules', 'zod', 'v4');

// zod re-exports every locale and Metro keeps all of them: English is the one that is used.
config.resolver.resolveRequest = (context, name, platform) => {
  const isLocales = /locales\/index\.(js|cjs)$/.test(name);
  if (isLocales && context.originModulePath.includes(zodFolder))
    return { type: 'sourceFile', filePath: path.join(__dirname, 'scripts', 'zod-locales.js') };
  return context.resolveRequest(context, name, platform);
};

// What is made inside the checkout is no source.
const made = ['.cache', 'build', 'dist'].map(
  (name) =>
    new RegExp(`^${path.join(__dirname, name, '/').replace(/[.*+?^${}()|[\]\\]/g, '\\$&')}`),
);
config.resolver.blockList = [config.resolver.blockList ?? []].flat().concat(made);

module.exports = config;
