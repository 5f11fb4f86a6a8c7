import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { planRequests, useBatchUpload, type UploadFile } from '@/composables/useBatchUpload';

type Answer = { status: number; body: unknown } | 'broken';
type Respond = (fileNames: string[]) => Answer;
let respond: Respond;
let sent: string[][] = [];

class FakeXhr {
  upload: { onprogress: ((event: { loaded: number }) => void) | null } = { onprogress: null };
  onload: (() => void) | null = null;
  onerror: (() => void) | null = null;
  onabort: (() => void) | null = null;
  status = 0;
  responseText = '';
  open(): void {}
  setRequestHeader(): void {}
  abort(): void {
    this.onabort?.();
  }
  send(form: FormData): void {
    const names = form.getAll('files').map((file) => (file as File).name);
    sent.push(names);
    const answer = respond(names);
    queueMicrotask(() => {
      if (answer === 'broken') return this.onerror?.();
      this.status = answer.status;
      this.responseText = JSON.stringify(answer.body);
      this.onload?.();
    });
  }
}

const limits = { maxFileBytes: 1_000_000, maxFilesPerRequest: 2 };
const rows = Array.from({ length: 20 }, (_, index) => `${index / 100},${Math.sin(index)}`).join('\n');
const named = (path: string) => ({ path, file: new File([`time,a\n${rows}`], path) });
const taken = (fileName: string) => ({
  id: `id-${fileName}`,
  fileName,
  state: 'queued',
  sha256: 'ab',
  sizeBytes: 1,
  format: 'csv',
  duplicateOfId: null,
});
const takeAll: Respond = (names) => ({ status: 201, body: { captures: names.map(taken), refused: [] } });

async function uploadOf(...paths: string[]) {
  const upload = useBatchUpload();
  await upload.add(paths.map(named), limits);
  return upload;
}
const statesOf = ({ files }: ReturnType<typeof useBatchUpload>) => files.value.map(({ state }) => state);

describe('useBatchUpload', () => {
  beforeEach(() => {
    sent = [];
    vi.stubGlobal('XMLHttpRequest', FakeXhr);
  });
  afterEach(() => vi.unstubAllGlobals());

  it('keeps what was taken and names why another file was refused', async () => {
    const upload = await uploadOf('a.csv', 'b.csv');
    respond = () => ({
      status: 201,
      body: { captures: [taken('a.csv')], refused: [{ fileName: 'b.csv', code: 'NOT_CSV', message: 'No numbers.' }] },
    });
    expect(await upload.send('b1', limits)).toBe(true);
    expect(statesOf(upload)).toEqual(['received', 'refused']);
    expect(upload.files.value[1]?.message).toBe('No numbers.');
  });

  it('sends again only what the server has not confirmed after the connection broke', async () => {
    const upload = await uploadOf('a.csv', 'b.csv', 'c.csv');
    respond = (names) => (names.includes('c.csv') ? 'broken' : takeAll(names));
    expect(await upload.send('b1', limits)).toBe(false);
    expect(statesOf(upload)).toEqual(['received', 'received', 'interrupted']);
    expect(upload.problem.value).toContain('The connection broke off.');

    sent = [];
    respond = takeAll;
    expect(await upload.send('b1', limits)).toBe(true);
    expect(sent).toEqual([['c.csv']]);
    expect(upload.receivedCount.value).toBe(3);
  });

  it('refuses a file that is larger than allowed without sending it', async () => {
    const upload = useBatchUpload();
    await upload.add([named('a.csv')], { ...limits, maxFileBytes: 10 });
    expect(statesOf(upload)).toEqual(['refused']);
    expect(upload.openCount.value).toBe(0);
  });

  it('adds a path only once', async () => {
    expect((await uploadOf('a.csv', 'b.csv')).files.value).toHaveLength(2);
    const upload = await uploadOf('a.csv');
    await upload.add([named('a.csv')], limits);
    expect(upload.files.value).toHaveLength(1);
  });
});

describe('planRequests', () => {
  const mebibyte = 1024 * 1024;
  const plan = (sizes: number[], most: number) =>
    planRequests(
      sizes.map((size) => ({ file: { size } }) as UploadFile),
      most,
    ).map((request) => request.map(({ file }) => file.size / mebibyte));

  it('puts no more files into a request than are allowed', () => {
    expect(plan([mebibyte, mebibyte, mebibyte], 2)).toEqual([[1, 1], [1]]);
  });

  it('closes a request before it outgrows 32 MiB and sends a larger file alone', () => {
    expect(
      plan(
        [20, 20, 100, 1].map((size) => size * mebibyte),
        10,
      ),
    ).toEqual([[20], [20], [100], [1]]);
  });

  it('plans nothing for no files', () => expect(plan([], 5)).toEqual([]));
});
