import { beforeEach, expect, it, vi } from 'vitest';
import { useBatchDraft } from '@/composables/useBatchDraft';

const complete = vi.hoisted(() => vi.fn(() => Promise.resolve({})));
vi.mock('@/api/batchesApi', () => ({ batchesApi: { create: () => Promise.resolve({ id: 'b1' }), complete } }));

let refused: string[] = [];
let duringSending: () => Promise<void> = () => Promise.resolve();

/** Takes every file but those in `refused`, under the names it was given. */
class FakeRequest {
  upload = {};
  onload: () => void = () => undefined;
  status = 201;
  responseText = '';
  open(): void {
    // Nothing goes anywhere.
  }
  setRequestHeader(): void {
    // Nothing goes anywhere.
  }
  async send(form: FormData): Promise<void> {
    const names = form.getAll('files').map((file) => (file as File).name);
    await duringSending();
    this.responseText = JSON.stringify({
      captures: names
        .filter((name) => !refused.includes(name))
        .map((fileName) => ({ id: fileName, fileName, sha256: 'a', duplicateOfId: null })),
      refused: names.filter((name) => refused.includes(name)).map((fileName) => ({ fileName, message: 'Broken.' })),
    });
    this.onload();
  }
}

const rows = Array.from({ length: 20 }, (_, row) => `${row / 100},${Math.sin(row)}`).join('\n');
const named = (path: string) => ({ path, file: new File([`time,a\n${rows}`], path.split('/').at(-1) ?? path) });
const limits = { maxFileBytes: 1e6, maxFilesPerRequest: 5 };
const statesOf = (draft: ReturnType<typeof useBatchDraft>) =>
  Object.fromEntries(draft.files.value.map(({ path, state }) => [path, state]));

beforeEach(() => {
  complete.mockClear();
  refused = [];
  duringSending = () => Promise.resolve();
  vi.stubGlobal('XMLHttpRequest', FakeRequest);
});

it('closes the batch when every file has been received', async () => {
  const draft = useBatchDraft('p');
  await draft.add([named('a.csv')], limits);
  expect(await draft.submit(limits)).toBe('b1');
  expect(complete).toHaveBeenCalledOnce();
});

it('does not close it while a file is still being looked at', async () => {
  const draft = useBatchDraft('p');
  await draft.add([named('a.csv')], limits);
  const slow = named('slow.csv');
  vi.spyOn(slow.file, 'slice').mockReturnValue({
    arrayBuffer: () => new Promise<ArrayBuffer>(() => undefined),
  } as unknown as Blob);
  void draft.add([slow], limits);
  expect(await draft.submit(limits)).toBeNull();
  expect(complete).not.toHaveBeenCalled();
});

it('keeps a file that was added while others were sent, and sends it next', async () => {
  const draft = useBatchDraft('p');
  await draft.add([named('a.csv')], limits);
  duringSending = () => draft.add([named('late.csv')], limits);
  expect(await draft.submit(limits)).toBeNull();
  expect(statesOf(draft)).toEqual({ 'a.csv': 'received', 'late.csv': 'ready' });
  expect(await draft.submit(limits)).toBe('b1');
});

it('shows a refusal before it closes the batch, and lets the file be sent again', async () => {
  const draft = useBatchDraft('p');
  await draft.add([named('a.csv'), named('b.csv')], limits);
  refused = ['b.csv'];
  expect(await draft.submit(limits)).toBeNull();
  expect(draft.problem.value).toContain('refused 1');
  refused = [];
  draft.sendAgain('b.csv');
  expect(await draft.submit(limits)).toBe('b1');
  expect(statesOf(draft)).toEqual({ 'a.csv': 'received', 'b.csv': 'received' });
});

it('closes the batch without a refused file when asked a second time', async () => {
  const draft = useBatchDraft('p');
  await draft.add([named('a.csv'), named('b.csv')], limits);
  refused = ['b.csv'];
  await draft.submit(limits);
  expect(await draft.submit(limits)).toBe('b1');
});

it('lists a file under the name that the server will give it', async () => {
  const draft = useBatchDraft('p');
  await draft.add([named('u\u0308/x\u202eb.csv')], limits);
  expect(Object.keys(statesOf(draft))).toEqual(['\u00fc/xb.csv']);
});

it('refuses a file that cannot be read and goes on with the next', async () => {
  const draft = useBatchDraft('p');
  const gone = named('gone.csv');
  vi.spyOn(gone.file, 'slice').mockReturnValue({
    arrayBuffer: () => Promise.reject(new DOMException('gone', 'NotReadableError')),
  } as unknown as Blob);
  await draft.add([gone, named('z.csv')], limits);
  expect(statesOf(draft)).toEqual({ 'gone.csv': 'refused', 'z.csv': 'ready' });
});
