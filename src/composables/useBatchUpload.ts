import type { AcquisitionSheet } from '@shared/schemas/acquisitionSheet.js';
import type { CsvLayout } from '@shared/schemas/csvLayout.js';
import { cleanFileName } from '@shared/utils/cleanFileName.js';
import { computed, ref, shallowRef, triggerRef } from 'vue';
import { ApiError } from '@/api/ApiError';
import { uploadCaptures } from '@/api/uploadCaptures';
import type { NamedFile } from '@/utils/collectDroppedFiles';
import { readFirstBytes, recogniseBytes, type RecognisedFile } from '@/utils/recogniseFile';

export type UploadState = 'reading' | 'ready' | 'sending' | 'received' | 'refused' | 'interrupted';

export interface UploadFile extends NamedFile {
  state: UploadState;
  recognised: RecognisedFile | null;
  acquisition: AcquisitionSheet;
  /** Only where a person corrected what was recognised. */
  csvLayout: CsvLayout | null;
  sentBytes: number;
  sha256: string | null;
  captureId: string | null;
  isDuplicate: boolean;
  /** Refused after it was sent: it may be sent again. */
  isRefusedByServer: boolean;
  message: string;
}

interface Limits {
  maxFileBytes: number;
  maxFilesPerRequest: number;
}

const requestsAtOnce = 2;
/** Small files share a request; a request is closed once it is this large. */
const requestBytes = 32 * 1024 * 1024;

const isOpen = ({ state }: UploadFile): boolean => state === 'ready' || state === 'interrupted';

/** Cuts the files still to be sent into requests. */
export function planRequests(files: UploadFile[], maxFilesPerRequest: number): UploadFile[][] {
  const requests: UploadFile[][] = [];
  let current: UploadFile[] = [];
  let bytes = 0;
  for (const file of files) {
    if (current.length > 0 && (current.length >= maxFilesPerRequest || bytes + file.file.size > requestBytes)) {
      requests.push(current);
      current = [];
      bytes = 0;
    }
    current.push(file);
    bytes += file.file.size;
  }
  return current.length > 0 ? [...requests, current] : requests;
}

/**
 * The files of a new batch and their way to the server. A request that breaks off leaves its files `interrupted`; sending
 * again is safe, since the server recognises what it has already.
 */
export function useBatchUpload() {
  const files = shallowRef<UploadFile[]>([]);
  const isSending = ref(false);
  const problem = ref('');
  let stopper = new AbortController();

  const changed = (): void => triggerRef(files);
  const openCount = computed(() => files.value.filter(isOpen).length);
  const readingCount = computed(() => files.value.filter(({ state }) => state === 'reading').length);
  const serverRefusals = computed(() => files.value.filter(({ isRefusedByServer }) => isRefusedByServer).length);
  const receivedCount = computed(() => files.value.filter(({ state }) => state === 'received').length);
  const totalBytes = computed(() =>
    files.value.reduce((sum, { file, state }) => sum + (state === 'refused' ? 0 : file.size), 0),
  );
  const sentBytes = computed(() =>
    files.value.reduce((sum, { file, state, sentBytes: sent }) => sum + (state === 'received' ? file.size : sent), 0),
  );

  async function recognise(entry: UploadFile, limits: Limits): Promise<void> {
    try {
      await examine(entry, limits);
    } catch {
      // The file was moved, or its drive taken out, since it was chosen: the others go on.
      entry.state = 'refused';
      entry.message = 'The browser can’t read this file. Choose it again.';
    }
  }

  async function examine(entry: UploadFile, limits: Limits): Promise<void> {
    if (entry.file.size > limits.maxFileBytes) {
      entry.state = 'refused';
      entry.message = 'The file is larger than this installation takes.';
      return;
    }
    const recognised = recogniseBytes(await readFirstBytes(entry.file), { name: entry.path, size: entry.file.size });
    entry.recognised = recognised;
    entry.state = recognised.format === 'refused' ? 'refused' : 'ready';
    entry.message = recognised.format === 'refused' ? recognised.message : '';
  }

  /** Adds files by path; one that is there already is not added twice. */
  async function add(found: NamedFile[], limits: Limits): Promise<void> {
    const known = new Set(files.value.map(({ path }) => path));
    const added = found
      // The name the server will list it under, so that its answer names the same file.
      .map((named) => ({ ...named, path: cleanFileName(named.path) ?? named.path }))
      .filter(({ path }) => !known.has(path))
      .map((named): UploadFile => ({
        ...named,
        state: 'reading',
        recognised: null,
        acquisition: {},
        csvLayout: null,
        sentBytes: 0,
        sha256: null,
        captureId: null,
        isDuplicate: false,
        isRefusedByServer: false,
        message: '',
      }));
    files.value = [...files.value, ...added];
    for (const entry of added) {
      await recognise(entry, limits);
      changed();
    }
  }

  /** Puts a file that the server refused back among those to be sent. */
  function sendAgain(path: string): void {
    const entry = files.value.find((file) => file.path === path && file.isRefusedByServer);
    if (entry) Object.assign(entry, { state: 'ready', isRefusedByServer: false, message: '', sentBytes: 0 });
    changed();
  }

  function remove(path: string): void {
    files.value = files.value.filter(
      (file) => file.path !== path || file.state === 'sending' || file.state === 'received',
    );
  }

  function settle(request: UploadFile[], answer: Awaited<ReturnType<typeof uploadCaptures>>): void {
    for (const entry of request) {
      const taken = answer.captures.find(({ fileName }) => fileName === entry.path);
      const refused = answer.refused.find(({ fileName }) => fileName === entry.path);
      if (taken) {
        entry.state = 'received';
        entry.sha256 = taken.sha256;
        entry.captureId = taken.id;
        entry.isDuplicate = taken.duplicateOfId !== null;
        entry.message = '';
      } else {
        entry.state = 'refused';
        entry.isRefusedByServer = true;
        entry.message = refused?.message ?? 'The server did not name this file in its answer. Send it again.';
      }
    }
  }

  /** Progress of a request is of all its files together: they are filled in order. */
  function spread(request: UploadFile[], loaded: number): void {
    let rest = loaded;
    for (const entry of request) {
      entry.sentBytes = Math.min(entry.file.size, Math.max(0, rest));
      rest -= entry.file.size;
    }
    changed();
  }

  async function sendRequest(batchId: string, request: UploadFile[]): Promise<void> {
    for (const entry of request) entry.state = 'sending';
    changed();
    try {
      const parts = request.map((entry) => ({
        path: entry.path,
        file: entry.file,
        ...(Object.keys(entry.acquisition).length > 0 ? { acquisition: entry.acquisition } : {}),
        ...(entry.csvLayout ? { csvLayout: entry.csvLayout } : {}),
      }));
      const onProgress = (loaded: number): void => spread(request, loaded);
      settle(request, await uploadCaptures(batchId, parts, { onProgress, signal: stopper.signal }));
    } catch (error) {
      const message = error instanceof ApiError ? error.message : 'The upload was stopped.';
      for (const entry of request) {
        entry.state = 'interrupted';
        entry.sentBytes = 0;
        entry.message = message;
      }
      throw error;
    } finally {
      changed();
    }
  }

  /** Sends everything that has not been received. @returns whether nothing was left over */
  async function send(batchId: string, limits: Limits): Promise<boolean> {
    problem.value = '';
    isSending.value = true;
    stopper = new AbortController();
    const requests = planRequests(files.value.filter(isOpen), limits.maxFilesPerRequest);
    const lane = async (): Promise<void> => {
      for (let request = requests.shift(); request; request = requests.shift()) await sendRequest(batchId, request);
    };
    try {
      const lanes = await Promise.allSettled(Array.from({ length: requestsAtOnce }, lane));
      const failed = lanes.find((result) => result.status === 'rejected');
      if (failed) {
        const reason: unknown = failed.reason;
        problem.value = `${reason instanceof ApiError ? reason.message : 'The upload was stopped.'} What was received is kept; send the rest again.`;
      }
      return !failed;
    } finally {
      isSending.value = false;
    }
  }

  return {
    files,
    isSending,
    problem,
    openCount,
    readingCount,
    serverRefusals,
    sendAgain,
    receivedCount,
    totalBytes,
    sentBytes,
    add,
    remove,
    send,
    stop: () => stopper.abort(),
    changed,
  };
}
