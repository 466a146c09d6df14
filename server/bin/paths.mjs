// Where things lie. Node built-ins only: this runs before node_modules exists.
import path from 'node:path';
import { fileURLToPath } from 'node:url';

export const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
export const inRoot = (...parts) => path.join(root, ...parts);

/** The folder with the cluster and the secrets of this machine; INCHWATER_DATA moves it. */
export const dataFolder = () => path.resolve(root, process.env.INCHWATER_DATA || '.data');
export const dist = inRoot('dist');
