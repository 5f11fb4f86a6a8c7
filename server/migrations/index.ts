import { CreateTables1796120000000 } from './1796120000000-CreateTables.js';
import { IndexReviewOrders1796124000000 } from './1796124000000-IndexReviewOrders.js';
import { AddCompanions1796128000000 } from './1796128000000-AddCompanions.js';

/** In order of time. Listed by hand, so that the compiled build needs no file patterns. */
export const migrations = [CreateTables1796120000000, IndexReviewOrders1796124000000, AddCompanions1796128000000];
