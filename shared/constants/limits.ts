/** Upload limits: told to the user before, enforced while receiving. The server's configuration may lower them. */
export const uploadLimits = {
  maxFileBytes: 2 * 1024 ** 3,
  maxFilesPerBatch: 1000,
  maxFilesPerRequest: 20,
  maxChannels: 64,
} as const;
