/** Version of the screening engine; stored with every result. Raise it when a measurement or a judgement may change. */
export const engineVersion = '1.1.0';
