import type { Config } from 'jest';

/** Packages that ship as ES modules only and must be transformed. */
const esm = ['jose', 'uuid', 'd3-[a-z-]+', 'internmap', 'bcryptjs', '@noble', 'expo-sqlite/web'].join('|');
const native =
  '(jest-)?react-native|@react-native(-community)?|expo(nent)?|@expo(nent)?/.*|@expo-google-fonts/.*|expo-modules-core|expo-router|react-native-svg|standard-navigation';

const moduleNameMapper = { '^@/(.*)$': '<rootDir>/$1' };
const withCluster = {
  globalSetup: '<rootDir>/tests/globalSetup.mjs',
  globalTeardown: '<rootDir>/tests/globalTeardown.mjs',
};
const seeded = { setupFiles: ['<rootDir>/tests/support/seed.ts'] };
const inNode = {
  testEnvironment: 'node',
  moduleNameMapper,
  transform: {
    '\\.[cm]?[jt]sx?$': [
      'babel-jest',
      {
        caller: { name: 'jest', platform: 'node', isServer: true },
        plugins: ['babel-plugin-transform-import-meta'], // jest 29 runs everything as CommonJS
      },
    ],
  },
  transformIgnorePatterns: [`node_modules/(?!(${esm})/)`],
} satisfies Config;

/**
 * Four projects, one total. `node` needs nothing but Node; `server` also a PostgreSQL; `web` draws components in jsdom;
 * `e2e` drives a real Chromium against the built app. A cluster is started only when a test that needs it runs.
 */
const config: Config = {
  projects: [
    {
      displayName: 'node',
      ...inNode,
      ...seeded,
      testMatch: ['<rootDir>/tests/{shared,stores,device}/**/*.test.ts'],
    },
    {
      displayName: 'server',
      ...inNode,
      ...seeded,
      ...withCluster,
      testMatch: ['<rootDir>/tests/{server,db,sim}/**/*.test.ts'],
    },
    {
      displayName: 'web',
      preset: 'jest-expo/web',
      testMatch: ['<rootDir>/tests/{components,app}/**/*.test.ts?(x)'],
      moduleNameMapper,
      transform: {
        '\\.mjs$': ['babel-jest', { caller: { name: 'metro', bundler: 'metro', platform: 'web' } }],
      },
      transformIgnorePatterns: [`node_modules/(?!(${native}|${esm}))`],
    },
    {
      displayName: 'e2e',
      ...inNode,
      ...withCluster,
      runner: '<rootDir>/tests/serialRunner.cjs',
      setupFilesAfterEnv: ['<rootDir>/tests/e2e/support/patience.ts'],
      testMatch: ['<rootDir>/tests/e2e/**/*.test.ts'],
    },
  ],
  testTimeout: 20_000,
  // by default jest leaves one core idle; of two, that is half the machine
  maxWorkers: '100%',
};

export default config;
