const path = require('node:path');

/** Packages that ship modules only; Node's require needs them transformed. */
const modulesOnly = ['d3-[a-z-]+', 'internmap', '@tanstack/[a-z-]+', '@hookform/resolvers'];

function transformWith(react) {
  const parser = { syntax: 'typescript', tsx: true };
  const transform = react ? { react: { runtime: 'automatic' } } : {};
  const options = { jsc: { target: 'es2022', parser, transform }, module: { type: 'commonjs' } };
  return { '\\.(ts|tsx|js|mjs)$': ['@swc/jest', options] };
}

const alias = { '^@/(.*)$': '<rootDir>/$1' };
const ignoredFolders = ['.cache', 'build', 'dist'].map((name) => `<rootDir>/${name}/`);

function project(displayName, settings) {
  return {
    displayName,
    cacheDirectory: path.join(__dirname, '.cache', 'jest'),
    testEnvironment: 'node',
    moduleNameMapper: alias,
    modulePathIgnorePatterns: ignoredFolders,
    setupFilesAfterEnv: ['<rootDir>/tests/patience.ts'],
    transform: transformWith(false),
    transformIgnorePatterns: [`/node_modules/(?!(${modulesOnly.join('|')})/)`],
    ...settings,
  };
}

const node = project('node', {
  testMatch: [
    '<rootDir>/tests/{server,pricing,shared,architecture,migrations,scripts}/**/*.test.ts',
  ],
});

/** react-native-web in jsdom, without Babel: the components that the browser gets. */
const web = project('web', {
  testEnvironment: 'jsdom',
  setupFilesAfterEnv: ['<rootDir>/tests/patience.ts', '<rootDir>/tests/patience-web.ts'],
  testMatch: ['<rootDir>/tests/{components,hooks,app}/**/*.test.{ts,tsx}'],
  moduleNameMapper: {
    ...alias,
    '^react-native$': 'react-native-web',
    '\\.(css|ttf|woff2)$': '<rootDir>/tests/empty.js',
  },
  moduleFileExtensions: ['web.tsx', 'web.ts', 'tsx', 'ts', 'web.js', 'js', 'mjs', 'cjs', 'json'],
  transform: transformWith(true),
  transformIgnorePatterns: [
    `/node_modules/(?!(${modulesOnly.join('|')}|react-native-svg|react-native-web)/)`,
  ],
});

/** Browser tests need the running product; `npm test` starts it and gives its address. */
const e2e = project('e2e', { testMatch: ['<rootDir>/tests/e2e/**/*.test.ts'] });

module.exports = {
  projects: process.env.E2E_BASE_URL ? [node, web, e2e] : [node, web],
};
