const longestName = 1024;
const longestPart = 255;

/** Control characters, and those that change the direction of writing: a name must read as it is. */
// eslint-disable-next-line no-control-regex -- control characters are what is looked for
const unreadable = /[\u0000-\u001f\u007f-\u009f\u200e\u200f\u202a-\u202e\u2066-\u2069\ufeff]/g;

/**
 * The name under which an uploaded file is listed: its folders kept, joined by `/`, without anything that climbs, points
 * to a drive or hides. It is a label only and never becomes a path on disk.
 * @returns null when nothing readable is left, or the name is too long to be told apart when cut
 */
export function cleanFileName(rawName: string): string | null {
  const parts = rawName
    .normalize('NFC')
    .replace(unreadable, '')
    .split(/[\\/]+/)
    .map((part) => part.trim())
    .filter((part) => part !== '' && part !== '.' && part !== '..' && !/^[A-Za-z]:$/.test(part));
  const name = parts.join('/');
  return name === '' || name.length > longestName || parts.some((part) => part.length > longestPart) ? null : name;
}
