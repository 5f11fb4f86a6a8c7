// A mail server that delivers nothing: it keeps each message as a file, for demo installations and tests.
// Usage: node smtpFake.mjs PORT FOLDER [HOST]
import { randomUUID } from 'node:crypto';
import { createWriteStream, mkdirSync } from 'node:fs';
import { rename } from 'node:fs/promises';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { SMTPServer } from 'smtp-server';

const [, , port, folder, host = '127.0.0.1'] = process.argv;
if (!port || !folder) {
  process.stderr.write('usage: node smtpFake.mjs PORT FOLDER [HOST]\n');
  process.exit(2);
}
mkdirSync(folder, { recursive: true });

async function keep(stream) {
  const name = `${new Date().toISOString().replaceAll(':', '-')}-${randomUUID().slice(0, 8)}.eml`;
  const unfinished = join(folder, `.${name}.part`);
  await pipeline(stream, createWriteStream(unfinished));
  // Only a whole message gets its final name: readers never see half of one.
  await rename(unfinished, join(folder, name));
}

const server = new SMTPServer({
  authOptional: true,
  disabledCommands: ['AUTH', 'STARTTLS'],
  onData: (stream, _session, callback) => {
    keep(stream).then(() => callback(), callback);
  },
});
server.on('error', (error) => process.stderr.write(`smtp: ${error.message}\n`));
server.listen(Number(port), host, () => process.stdout.write(`smtp: keeping messages in ${folder}\n`));
for (const signal of ['SIGTERM', 'SIGINT']) process.once(signal, () => server.close(() => process.exit(0)));
