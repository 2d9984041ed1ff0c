/**
 * Stands in the web bundle for what this application never uses: native stacks, tab bars, site map,
 * page heads and link previews of the router, hydration and parallel queries of react-query, views of
 * react-native-web that have no place on its pages, JSON schemas of zod, which only the server
 * writes, and its compiler, which the content policy forbids. What is left is what is asked for
 * while loading.
 */
const { createContext, Fragment } = require('react');

function LeftOut() {
  throw new Error('This is left out of the web bundle; see metro.config.js.');
}

/** The router stands its root in this provider, wanted or not. */
const Head = Object.assign(() => LeftOut(), { Provider: Fragment });

module.exports = {
  __esModule: true,
  default: LeftOut,
  Head,
  createNativeStackNavigator: () => ({ Navigator: LeftOut }),
  BottomTabBarHeightContext: createContext(undefined),
  isNativeTabTrigger: () => false,
  initScreensFeatureFlags: () => undefined,
  createToJSONSchemaMethod: LeftOut,
  createStandardJSONSchemaMethod: LeftOut,
};
