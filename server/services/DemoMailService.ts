import { readdir, readFile, stat } from 'node:fs/promises';
import path from 'node:path';
import { simpleParser, type AddressObject, type ParsedMail } from 'mailparser';
import type { DemoMail, DemoMailDetail } from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';
import { NotFoundError } from '../errors/index.js';

const extension = '.eml';
const listLimit = 100;

function addressText(value: AddressObject | AddressObject[] | undefined): string {
  return [value ?? []]
    .flat()
    .map(({ text }) => text)
    .join(', ');
}

function summarise(id: string, mail: ParsedMail, storedAt: Date): DemoMail {
  return {
    id,
    from: addressText(mail.from),
    to: addressText(mail.to),
    subject: mail.subject ?? '',
    sentAt: (mail.date ?? storedAt).toISOString(),
  };
}

/** Reads what the local SMTP fake has caught. Only in a demo: the mails hold one-time links of everybody. */
export class DemoMailService {
  constructor(private readonly deps: Pick<AppDependencies, 'config'>) {}

  /** @throws NotFoundError outside a demo, as if the page were not there */
  async list(): Promise<DemoMail[]> {
    this.requireDemo();
    const files = await this.newestFiles();
    return Promise.all(files.map(async ({ id, storedAt }) => summarise(id, await this.parse(id), storedAt)));
  }

  async read(id: string): Promise<DemoMailDetail> {
    this.requireDemo();
    const found = (await this.newestFiles()).find((file) => file.id === id);
    if (!found) throw new NotFoundError();
    const mail = await this.parse(id);
    return {
      ...summarise(id, mail, found.storedAt),
      text: mail.text ?? '',
      html: typeof mail.html === 'string' ? mail.html : '',
    };
  }

  private requireDemo(): void {
    if (!this.deps.config.OVERFOLD_DEMO) throw new NotFoundError();
  }

  private async parse(id: string): Promise<ParsedMail> {
    return simpleParser(await readFile(path.join(this.deps.config.DEMO_MAIL_DIR, `${id}${extension}`)));
  }

  private async newestFiles(): Promise<{ id: string; storedAt: Date }[]> {
    const folder = this.deps.config.DEMO_MAIL_DIR;
    const names = await readdir(folder).catch((error: NodeJS.ErrnoException) => {
      // No mail has been caught yet.
      if (error.code === 'ENOENT') return [];
      throw error;
    });
    const files = await Promise.all(
      names
        .filter((name) => name.endsWith(extension))
        .map(async (name) => ({
          id: name.slice(0, -extension.length),
          storedAt: (await stat(path.join(folder, name))).mtime,
        })),
    );
    return files.sort((a, b) => b.storedAt.getTime() - a.storedAt.getTime()).slice(0, listLimit);
  }
}
