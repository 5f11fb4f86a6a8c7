import { parseArgs } from 'node:util';
import { z } from 'zod';
import { emailSchema, nameSchema } from '../shared/schemas/common.js';
import { parseConfig } from './config/config.js';
import { connectDatabase } from './connectDatabase.js';
import { PasswordHasher } from './security/PasswordHasher.js';
import { UserCommandService } from './services/UserCommandService.js';

const usage = `Usage:
  npm run user -- add --email ADDRESS --name "NAME" [--admin] [--password-stdin]
      adds a user; prints an invitation link, or reads the password from standard input
  npm run user -- list
  npm run user -- deactivate --email ADDRESS`;

const argumentsSchema = z.discriminatedUnion(
  'command',
  [
    z.strictObject({
      command: z.literal('add'),
      email: emailSchema,
      name: nameSchema,
      admin: z.boolean().default(false),
      'password-stdin': z.boolean().default(false),
    }),
    z.strictObject({ command: z.literal('list') }),
    z.strictObject({ command: z.literal('deactivate'), email: emailSchema }),
  ],
  { error: 'Say what to do: add, list or deactivate.' },
);
/** The command was called wrongly: the usage helps. */
class UsageError extends Error {}

const isParseArgsError = (error: unknown): boolean =>
  error instanceof Error && 'code' in error && String(error.code).startsWith('ERR_PARSE_ARGS');

type UserArguments = z.infer<typeof argumentsSchema>;

function readArguments(): UserArguments {
  const { values, positionals } = parseArgs({
    allowPositionals: true,
    options: {
      email: { type: 'string' },
      name: { type: 'string' },
      admin: { type: 'boolean' },
      'password-stdin': { type: 'boolean' },
    },
  });
  if (positionals.length > 1) throw new UsageError(`Too many words: ${positionals.slice(1).join(' ')}`);
  const parsed = argumentsSchema.safeParse({ command: positionals[0], ...values });
  if (parsed.success) return parsed.data;
  throw new UsageError(parsed.error.issues.map(({ path, message }) => `${path.join('.')}: ${message}`).join('\n'));
}

async function readPassword(): Promise<string> {
  let text = '';
  for await (const chunk of process.stdin) text += String(chunk);
  return text.replace(/\r?\n$/, '');
}

async function run(service: UserCommandService, args: UserArguments): Promise<void> {
  if (args.command === 'list') {
    for (const user of await service.list()) {
      const marks = [user.isAdmin && 'admin', !user.isActive && 'inactive', !user.passwordHash && 'invited'];
      console.log([user.email, user.name, ...marks.filter(Boolean)].join('\t'));
    }
  } else if (args.command === 'deactivate') {
    await service.deactivate(args.email);
    console.log(`Deactivated ${args.email}; all sessions ended.`);
  } else if (args['password-stdin']) {
    await service.addWithPassword({ email: args.email, name: args.name, isAdmin: args.admin }, await readPassword());
    console.log(`Added ${args.email}. Sign in with the password given.`);
  } else {
    const url = await service.addWithInvitation({ email: args.email, name: args.name, isAdmin: args.admin });
    console.log(`Added ${args.email}. Choose a password here (once, within 7 days):\n${url}`);
  }
}

/** `npm run user -- …`: how an installation gets its first administrator. */
async function main(): Promise<void> {
  const args = readArguments();
  const config = parseConfig(process.env);
  const dataSource = await connectDatabase(config, { poolSize: 2 });
  const passwords = new PasswordHasher(config.BCRYPT_COST);
  try {
    await run(new UserCommandService({ config, dataSource, passwords, now: () => new Date() }), args);
  } finally {
    await dataSource.destroy();
  }
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : error);
  if (error instanceof UsageError || isParseArgsError(error)) console.error(`\n${usage}`);
  process.exitCode = 1;
});
