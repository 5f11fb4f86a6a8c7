/** The last part of an uploaded name: results speak of the file, not of the folder it lay in. */
export const fileLabel = (fileName: string): string => fileName.split('/').at(-1) ?? fileName;
