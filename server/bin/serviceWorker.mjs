// Writes sw.js: everything of the build is kept on the device at the first visit, so that the app opens without a
// network. Usage: node server/bin/serviceWorker.mjs <folder of the build>
import { generateSW } from 'workbox-build';

const folder = process.argv[2];

const { count, size, warnings } = await generateSW({
  globDirectory: folder,
  swDest: `${folder}/sw.js`,
  globPatterns: ['**/*.{html,js,css,wasm,ttf,woff2,png,svg,ico,webmanifest}'],
  // the default leaves out node_modules, and that is where Expo puts the database's wasm
  globIgnores: ['sw.js', '**/metadata.json'],
  // the default of 2 MiB silently leaves out the bundle
  maximumFileSizeToCacheInBytes: 8 * 1024 * 1024,
  // Metro writes a hash into these names already
  dontCacheBustURLsMatching: /[.-][0-9a-f]{32}\./,
  navigateFallback: '/index.html',
  navigateFallbackDenylist: [/^\/api\//, /\/[^/?]+\.[^/]+$/],
  cleanupOutdatedCaches: true,
  clientsClaim: true,
  // a new version is offered, never forced in mid-run: the page asks the waiting worker with SKIP_WAITING
  skipWaiting: false,
  inlineWorkboxRuntime: true,
  sourcemap: false,
  mode: 'production',
});

if (warnings.length > 0) {
  console.error(warnings.join('\n'));
  process.exitCode = 1;
}
console.log(`${count} files, ${Math.round(size / 1024)} KiB kept for offline use`);
