export type OnBlock = (channels: Float64Array[], frames: number, firstFrame: number) => void;

/** Reads the source once more; `index` 0 … 2 places the pass in the progress. */
export type Pass = (index: number, onBlock: OnBlock) => void;
