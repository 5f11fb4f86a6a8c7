const entities: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };

/** For text and quoted attributes. */
export const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (character) => entities[character] ?? '');
