/** The one-time token in the text of a mail. */
export function linkTokenIn(text: string, page: '/invitation/' | '/reset/'): string {
  const token = new RegExp(`${page}([\\w-]+)`).exec(text)?.[1];
  if (!token) throw new Error(`There is no ${page} link in this mail:\n${text}`);
  return token;
}
