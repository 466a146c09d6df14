const { getDefaultConfig } = require('expo/metro-config');

const config = getDefaultConfig(__dirname);
// expo-sqlite on the web imports wa-sqlite.wasm as an asset
if (!config.resolver.assetExts.includes('wasm')) config.resolver.assetExts.push('wasm');
// nothing in these belongs to the app; watching the cluster's files makes Metro busy for nothing
config.resolver.blockList = [/[/\\](\.data|artifacts|dist|\.git)[/\\].*/];

module.exports = config;
