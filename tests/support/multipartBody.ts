export interface FilePart {
  /** Sent as it is: libraries would tidy a hostile name. */
  name: string;
  bytes: Buffer;
}

const boundary = 'overfold-test-boundary';

/** A form as a browser would send it. */
export function multipartBody(
  files: FilePart[],
  fields: Record<string, string> = {},
  fieldName = 'files',
): { contentType: string; body: Buffer } {
  const parts = [
    ...Object.entries(fields).flatMap(([name, value]) => [
      `--${boundary}\r\nContent-Disposition: form-data; name="${name}"\r\n\r\n${value}\r\n`,
    ]),
    ...files.flatMap(({ name, bytes }) => [
      `--${boundary}\r\nContent-Disposition: form-data; name="${fieldName}"; filename="${name}"\r\n` +
        'Content-Type: application/octet-stream\r\n\r\n',
      bytes,
      '\r\n',
    ]),
    `--${boundary}--\r\n`,
  ];
  return {
    contentType: `multipart/form-data; boundary=${boundary}`,
    body: Buffer.concat(parts.map((part) => Buffer.from(part as string))),
  };
}
