/**
 * Stands in the web bundle for what this application never draws: native stacks, tab bars and link
 * previews of the router, animated views and scrolling lists of react-native-web. Every layout here
 * is a plain slot and every list a plain table, so only what is asked for while loading is left.
 */
const { createContext } = require('react');

function LeftOut() {
  throw new Error('This component is left out of the web bundle; see metro.config.js.');
}

module.exports = {
  __esModule: true,
  default: LeftOut,
  createNativeStackNavigator: () => ({ Navigator: LeftOut }),
  BottomTabBarHeightContext: createContext(undefined),
  isNativeTabTrigger: () => false,
  initScreensFeatureFlags: () => undefined,
};
