import { CreateTables1796120000000 } from './1796120000000-CreateTables.js';

/** In order of time. Listed by hand, so that the compiled build needs no file patterns. */
export const migrations = [CreateTables1796120000000];
