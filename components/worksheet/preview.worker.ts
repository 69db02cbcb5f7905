import { expose } from 'comlink';
import { preview } from './preview';

/** Keeps the arithmetic off the page's thread, so that the dial never stutters. */
const api = { preview };
export type PreviewWorker = typeof api;

expose(api);
