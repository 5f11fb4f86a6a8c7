import { randomUUID } from 'node:crypto';
import { mkdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { MailMessage, type User } from '../../../server/entities/index.js';
import type { MailState } from '../../../server/entities/MailMessage.js';
import { queueMail } from '../../../server/mailbox/queueMail.js';
import { buildUser } from '../../support/factories/buildUser.js';
import { errorOf } from '../../support/errorOf.js';
import { createTestApp, type TestApp, type TestClient } from '../../support/testApp.js';

let app: TestApp;
let admin: User;
let client: TestClient;

async function start(isDemo = false): Promise<void> {
  app = await createTestApp({ config: { OVERFOLD_DEMO: isDemo } });
  admin = await buildUser(app.deps.dataSource, { isAdmin: true });
  client = await app.as(admin);
}
beforeEach(() => start());
afterEach(() => app.close());

async function buildMail(state: MailState, subject: string = state): Promise<MailMessage> {
  const { manager } = app.deps.dataSource;
  const dedupeKey = randomUUID();
  await queueMail(manager, {
    dedupeKey,
    kind: 'invitation',
    recipient: 'ines@marram.example',
    subject,
    text: 'secret-link',
    html: '<p>secret-link</p>',
  });
  await manager.update(MailMessage, { dedupeKey }, { state, attempts: 3, lastError: 'refused' });
  return manager.findOneByOrFail(MailMessage, { dedupeKey });
}

describe('queueMail', () => {
  it('writes one mail a key, however often it is asked', async () => {
    const mail = {
      dedupeKey: 'k',
      kind: 'invitation',
      recipient: 'a@x.example',
      subject: 'S',
      text: 'T',
      html: 'H',
    } as const;
    const { manager } = app.deps.dataSource;
    expect(await queueMail(manager, mail)).toBe(true);
    expect(await queueMail(manager, { ...mail, subject: 'Other' })).toBe(false);
    expect((await manager.find(MailMessage)).map(({ subject }) => subject)).toEqual(['S']);
  });

  it('keeps line breaks out of a subject and cuts it to the length of the column', async () => {
    const mail = await buildMail('pending', `Batch\r\nBcc: eve@evil.example ${'x'.repeat(300)}`);
    expect(mail.subject).toMatch(/^Batch Bcc: eve@evil.example x+$/);
    expect(mail.subject).toHaveLength(255);
  });

  it('leaves nothing behind when the transaction of the event fails', async () => {
    const work = app.deps.dataSource.transaction(async (manager) => {
      await queueMail(manager, {
        dedupeKey: 'k',
        kind: 'invitation',
        recipient: 'a@x.example',
        subject: 'S',
        text: 'T',
        html: 'H',
      });
      throw new Error('the event failed');
    });
    await expect(work).rejects.toThrow('the event failed');
    expect(await app.deps.dataSource.manager.count(MailMessage)).toBe(0);
  });
});

describe('GET /mail', () => {
  it('lists the newest first, by state when asked, and never the texts', async () => {
    await buildMail('sent');
    await buildMail('failed');
    const all = await client.get('/mail');
    expect(all.body.items.map(({ subject }: { subject: string }) => subject)).toEqual(['failed', 'sent']);
    expect(all.text).not.toContain('secret-link');
    const failed = await client.get('/mail?state=failed');
    expect(failed.body.items).toEqual([
      expect.objectContaining({ state: 'failed', attempts: 3, lastError: 'refused' }),
    ]);
  });

  it('refuses an unknown state', async () => {
    expect(errorOf(await client.get('/mail?state=lost'))).toEqual({ status: 400, code: 'INVALID_INPUT' });
  });
});

describe('POST /mail/:mailId/resend', () => {
  it.each(['failed', 'unknown'] as const)(
    'puts a mail that is %s back into the outbox under its old Message-ID',
    async (state) => {
      const before = await buildMail(state);
      expect((await client.post(`/mail/${before.id}/resend`)).status).toBe(202);
      const after = await app.deps.dataSource.manager.findOneByOrFail(MailMessage, { id: before.id });
      expect(after).toMatchObject({ state: 'pending', attempts: 0, lastError: null, messageId: before.messageId });
    },
  );

  it.each(['pending', 'sending', 'sent'] as const)(
    'answers 409 NOT_RESENDABLE for a mail that is %s',
    async (state) => {
      const mail = await buildMail(state);
      expect(errorOf(await client.post(`/mail/${mail.id}/resend`))).toEqual({ status: 409, code: 'NOT_RESENDABLE' });
      expect((await app.deps.dataSource.manager.findOneByOrFail(MailMessage, { id: mail.id })).state).toBe(state);
    },
  );

  it('answers 404 for an unknown mail', async () => {
    expect(errorOf(await client.post(`/mail/${randomUUID()}/resend`))).toEqual({ status: 404, code: 'NOT_FOUND' });
  });
});

describe('GET /demo/mail', () => {
  const caught = [
    'From: Overfold <overfold@localhost>',
    'To: Ines <ines@marram.example>',
    'Subject: =?utf-8?q?Pr=C3=BCfung?=',
    'Date: Mon, 02 Mar 2026 10:00:00 +0000',
    'MIME-Version: 1.0',
    'Content-Type: multipart/alternative; boundary=b',
    '',
    '--b',
    'Content-Type: text/plain; charset=utf-8',
    '',
    'Grüße',
    '--b',
    'Content-Type: text/html; charset=utf-8',
    '',
    '<p>Gr&uuml;&szlig;e</p>',
    '--b--',
    '',
  ].join('\r\n');

  async function startDemo(): Promise<TestClient> {
    await app.close();
    await start(true);
    return app.as(await buildUser(app.deps.dataSource));
  }
  const keep = async (name: string): Promise<void> => {
    await mkdir(app.deps.config.DEMO_MAIL_DIR, { recursive: true });
    await writeFile(path.join(app.deps.config.DEMO_MAIL_DIR, name), caught);
  };

  it('lists the caught mails and shows one', async () => {
    const anyone = await startDemo();
    await keep('1772445600000-abc.eml');
    await keep('notes.txt');
    const list = await anyone.get('/demo/mail');
    expect(list.body.items).toEqual([
      {
        id: '1772445600000-abc',
        from: '"Overfold" <overfold@localhost>',
        to: '"Ines" <ines@marram.example>',
        subject: 'Prüfung',
        sentAt: '2026-03-02T10:00:00.000Z',
      },
    ]);
    const one = await anyone.get('/demo/mail/1772445600000-abc');
    expect(one.body).toMatchObject({ subject: 'Prüfung', text: expect.stringContaining('Grüße') });
    expect(one.body.html).toContain('<p>Gr&uuml;&szlig;e</p>');
  });

  it('lists nothing before a mail was caught', async () => {
    expect((await (await startDemo()).get('/demo/mail')).body).toEqual({ items: [] });
  });

  it.each(['nothing-here', '..%2f..%2fpackage', '%2e%2e', '.hidden'])(
    'does not read outside its folder: %s',
    async (id) => {
      const anyone = await startDemo();
      await keep('a.eml');
      expect([400, 404]).toContain((await anyone.get(`/demo/mail/${id}`)).status);
      expect((await anyone.get('/demo/mail/a')).status).toBe(200);
    },
  );

  it('answers 404 outside a demo, to administrators too', async () => {
    await keep('a.eml');
    expect(errorOf(await client.get('/demo/mail'))).toEqual({ status: 404, code: 'NOT_FOUND' });
    expect(errorOf(await client.get('/demo/mail/a'))).toEqual({ status: 404, code: 'NOT_FOUND' });
  });
});
