/** For LIKE with its default escape character: what a user types is searched literally. */
export const escapeLikePattern = (text: string): string => text.replace(/[\\%_]/g, (character) => `\\${character}`);
