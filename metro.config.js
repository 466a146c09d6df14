const http = require('node:http');
const path = require('node:path');
const { getDefaultConfig } = require('expo/metro-config');

const config = getDefaultConfig(__dirname);
// expo-sqlite on the web imports wa-sqlite.wasm as an asset
if (!config.resolver.assetExts.includes('wasm')) config.resolver.assetExts.push('wasm');
// nothing in these belongs to the app; watching the cluster's files would only keep Metro busy
const ours = ['.data', 'artifacts', 'dist', '.git'].map((name) => path.join(__dirname, name) + path.sep);
config.resolver.blockList = ours.map((folder) => new RegExp(`^${folder.replace(/[^\w/]/g, '\\$&')}`));

/** Passes a request on as if the browser had asked the server itself, so that cookies and origin checks hold. */
function passOn(target, req, res) {
  const headers = { ...req.headers, host: target.host };
  if (headers.origin) headers.origin = target.origin;
  const there = http.request(new URL(req.url, target), { method: req.method, headers }, (answer) => {
    res.writeHead(answer.statusCode, answer.headers);
    answer.pipe(res);
  });
  there.on('error', () => {
    if (!res.headersSent) res.writeHead(502);
    res.end();
  });
  res.on('close', () => there.destroy());
  req.pipe(there);
}

// npm run dev only: one origin for app and API
if (process.env.INCHWATER_API) {
  const target = new URL(process.env.INCHWATER_API);
  config.server.enhanceMiddleware = (middleware) => (req, res, next) =>
    req.url.startsWith('/api/') ? passOn(target, req, res) : middleware(req, res, next);
}

module.exports = config;
