const path = require('node:path');
const { getDefaultConfig } = require('expo/metro-config');

const config = getDefaultConfig(__dirname);

const zodFolder = path.join('node_modules', 'zod', 'v4');
const standIn = (name) => ({ type: 'sourceFile', filePath: path.join(__dirname, 'scripts', name) });

/**
 * Never used by an application of plain slots, tables and fields: Metro would keep all of it, which
 * is two fifths of the first script.
 */
const unused = {
  '@tanstack/query-core/build/modern': ['hydration', 'queriesObserver', 'streamedQuery'],
  '@tanstack/react-query/build/modern': ['HydrationBoundary', 'useMutationState', 'useQueries'],
  'expo-router/build': [
    'fork/native-stack/createNativeStackNavigator',
    'head/ExpoHead',
    'layouts/Tabs',
    'layouts/_web-modal',
    'layouts/experimental-stack',
    'layouts/stack-utils',
    'link/preview/HrefPreview',
    'native-tabs/NativeTabTrigger',
    'react-navigation/bottom-tabs',
    'react-navigation/core/StaticNavigation',
    'react-navigation/native/createStaticNavigation',
    'react-navigation/routers/DrawerRouter',
    'react-navigation/routers/TabRouter',
    'screensFeatureFlags',
    'views/Toast',
    'views/Unmatched',
    'views/Sitemap',
    'views/useSitemap',
  ],
  'react-native-web/dist/exports': [
    ...['ActivityIndicator', 'Animated', 'Button', 'CheckBox', 'FlatList', 'Image'],
    ...['ImageBackground', 'KeyboardAvoidingView', 'LayoutAnimation', 'Modal', 'PanResponder'],
    ...[
      'Picker',
      'Share',
      'Vibration',
      'ProgressBar',
      'RefreshControl',
      'ScrollView',
      'SectionList',
      'Switch',
      'TextInput',
    ],
    ...['Touchable', 'TouchableHighlight', 'TouchableNativeFeedback', 'TouchableOpacity'],
    ...['TouchableWithoutFeedback', 'VirtualizedList'],
  ],
  'zod/v4': [
    'classic/from-json-schema',
    'core/compile',
    'core/json-schema-generator',
    'core/json-schema-processors',
    'core/to-json-schema',
  ],
};
const unusedFiles = Object.entries(unused).flatMap(([folder, names]) =>
  names.map((name) => path.join('node_modules', ...`${folder}/${name}`.split('/'))),
);

function isUnused(importer, name) {
  if (!name.startsWith('.')) return false;
  const target = path.join(path.dirname(importer), name.replace(/\.c?js$/, ''));
  return unusedFiles.some((file) => target.endsWith(file));
}

config.resolver.resolveRequest = (context, name, platform) => {
  const isLocales = /locales\/index\.(js|cjs)$/.test(name);
  // zod re-exports every locale and Metro keeps all of them: English is the one that is used.
  if (isLocales && context.originModulePath.includes(zodFolder)) return standIn('zod-locales.js');
  if (isUnused(context.originModulePath, name)) return standIn('web-unused.js');
  return context.resolveRequest(context, name, platform);
};

// What is made inside the checkout is no source.
const made = ['.cache', 'build', 'dist'].map(
  (name) =>
    new RegExp(`^${path.join(__dirname, name, '/').replace(/[.*+?^${}()|[\]\\]/g, '\\$&')}`),
);
config.resolver.blockList = [config.resolver.blockList ?? []].flat().concat(made);

module.exports = config;
