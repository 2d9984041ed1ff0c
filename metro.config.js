const path = require('node:path');
const { getDefaultConfig } = require('expo/metro-config');
const config = getDefaultConfig(__dirname);
// zod re-exports every locale and Metro does not tree-shake: keep English only
config.resolver.resolveRequest = (context, name, platform) => {
  if (
    /[/\\]zod[/\\]v4[/\\]/.test(context.originModulePath) &&
    /locales\/index\.(js|cjs)$/.test(name)
  ) {
    return { type: 'sourceFile', filePath: path.join(__dirname, 'scripts/zod-locales.js') };
  }
  return context.resolveRequest(context, name, platform);
};
// server-only trees never belong in the web bundle; keep Metro from crawling them
config.resolver.blockList = [
  new RegExp(
    `^${path.resolve(__dirname, '(build|dist|dist-[a-z]+)').replace(/[.]/g, '\\.')}[/\\\\].*`,
  ),
];
module.exports = config;
