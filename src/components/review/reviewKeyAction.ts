export type ReviewAction = 'next' | 'previous' | 'open' | 'decide' | 'help';

const always: Record<string, ReviewAction> = { ArrowDown: 'next', ArrowUp: 'previous', Enter: 'open' };
/** Single letters can be turned off (WCAG 2.1.4). */
const letters: Record<string, ReviewAction> = { j: 'next', k: 'previous', d: 'decide', '?': 'help' };

export function reviewKeyAction(key: string, areLettersOn: boolean): ReviewAction | null {
  return always[key] ?? (areLettersOn ? (letters[key] ?? null) : null);
}
