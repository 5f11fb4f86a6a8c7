export { writeSyntheticSet } from '../syntheticSet.js';
