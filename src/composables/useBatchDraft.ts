import type { AcquisitionSheet } from '@shared/schemas/acquisitionSheet.js';
import { ref, watch } from 'vue';
import { batchesApi } from '@/api/batchesApi';
import { errorText } from '@/utils/errorText';
import { useBatchUpload, type UploadFile } from './useBatchUpload';

interface Limits {
  maxFileBytes: number;
  maxFilesPerRequest: number;
}

/** A batch from its name to its last file: made once, then filled, and closed when everything is there. */
export function useBatchDraft(projectId: string) {
  const upload = useBatchUpload();
  const name = ref('');
  const acquisition = ref<AcquisitionSheet>({});
  const batchId = ref<string | null>(null);
  const problem = ref('');
  const unmatched = ref<string[]>([]);
  const tick = ref(0);
  let fromManifest: Record<string, AcquisitionSheet> = {};
  watch(upload.files, () => (tick.value += 1));

  const sheetFor = ({ path }: UploadFile): AcquisitionSheet | undefined =>
    fromManifest[path] ?? fromManifest[path.split('/').at(-1) ?? ''];

  /** Sheets of a manifest go to the files they name, also to those added later. */
  function applyManifest(byFile?: Record<string, AcquisitionSheet>): void {
    if (byFile) fromManifest = byFile;
    const used = new Set<AcquisitionSheet>();
    for (const entry of upload.files.value) {
      const sheet = sheetFor(entry);
      if (!sheet) continue;
      used.add(sheet);
      if (Object.keys(entry.acquisition).length === 0) entry.acquisition = sheet;
    }
    unmatched.value = Object.entries(fromManifest).flatMap(([file, sheet]) => (used.has(sheet) ? [] : [file]));
    upload.changed();
  }

  /**
   * Sends what is to be sent and closes the batch. Nothing is closed while a file is still being looked at or waits, nor in
   * the same step in which the server refused one: its reason must be seen first.
   * @returns the batch's id when it is closed; null when something is left
   */
  async function submit(limits: Limits): Promise<string | null> {
    problem.value = '';
    try {
      batchId.value ??= (
        await batchesApi.create(projectId, { name: name.value.trim(), acquisition: acquisition.value })
      ).id;
      const refusalsBefore = upload.serverRefusals.value;
      const isAllSent = await upload.send(batchId.value, limits);
      const refusals = upload.serverRefusals.value - refusalsBefore;
      if (refusals > 0) {
        problem.value = `The server refused ${refusals} of the files; the list says why. Send them again, or finish the batch without them.`;
      }
      const isLeft = upload.openCount.value > 0 || upload.readingCount.value > 0 || refusals > 0;
      if (!isAllSent || isLeft || upload.receivedCount.value === 0) return null;
      await batchesApi.complete(batchId.value);
      return batchId.value;
    } catch (error) {
      problem.value = errorText(error);
      return null;
    }
  }

  return {
    ...upload,
    name,
    acquisition,
    batchId,
    sendProblem: upload.problem,
    problem,
    unmatched,
    tick,
    applyManifest,
    submit,
  };
}
