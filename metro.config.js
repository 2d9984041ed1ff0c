const path = require('node:path');
const { getDefaultConfig } = require('expo/metro-config');

const config = getDefaultConfig(__dirname);

const zodFolder = path.join('node_modules', 'zod', 'v4');
const standIn = (name) => ({ type: 'sourceFile', filePath: path.join(__dirname, 'scripts', name) });

/** Never drawn by an application of plain slots and tables, and a third of the first script. */
const undrawn = {
  'expo-router/build': [
    'fork/native-stack/createNativeStackNavigator',
    'layouts/Tabs',
    'layouts/experimental-stack',
    'layouts/stack-utils',
    'link/preview/HrefPreview',
    'native-tabs/NativeTabTrigger',
    'react-navigation/bottom-tabs',
    'screensFeatureFlags',
  ],
  'react-native-web/dist': [
    'exports/Animated',
    'exports/FlatList',
    'exports/SectionList',
    'exports/VirtualizedList',
  ],
};
const undrawnFiles = Object.entries(undrawn).flatMap(([folder, names]) =>
  names.map((name) => path.join('node_modules', ...`${folder}/${name}`.split('/'))),
);
const isUndrawn = (target) => undrawnFiles.some((file) => target.endsWith(file));

config.resolver.resolveRequest = (context, name, platform) => {
  const isLocales = /locales\/index\.(js|cjs)$/.test(name);
  // zod re-exports every locale and Metro keeps all of them: English is the one that is used.
  if (isLocales && context.originModulePath.includes(zodFolder)) return standIn('zod-locales.js');
  if (name.startsWith('.') && isUndrawn(path.join(path.dirname(context.originModulePath), name)))
    return standIn('web-unused.js');
  return context.resolveRequest(context, name, platform);
};

// What is made inside the checkout is no source.
const made = ['.cache', 'build', 'dist'].map(
  (name) =>
    new RegExp(`^${path.join(__dirname, name, '/').replace(/[.*+?^${}()|[\]\\]/g, '\\$&')}`),
);
config.resolver.blockList = [config.resolver.blockList ?? []].flat().concat(made);

module.exports = config;
