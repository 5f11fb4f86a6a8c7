import type { z } from 'zod';
import { uploadLimits } from '../../shared/constants/limits.js';
import type {
  BatchDto,
  batchListQuerySchema,
  createBatchSchema,
  updateBatchSchema,
} from '../../shared/schemas/batch.js';
import type { CaptureRow, captureListQuerySchema, UploadResponse } from '../../shared/schemas/capture.js';
import type { Page } from '../../shared/schemas/common.js';
import type { AppDependencies } from '../AppDependencies.js';
import { receiveUpload } from '../middleware/receiveUpload.js';
import type { Actor } from '../policies/Actor.js';
import { presentBatch } from '../presenters/presentBatch.js';
import { presentCaptureRow } from '../presenters/presentCaptureRow.js';
import { presentUpload } from '../presenters/presentUpload.js';
import type { RouteInput } from '../routes/Route.js';
import { BatchService } from '../services/BatchService.js';
import { CaptureService } from '../services/CaptureService.js';
import { UploadService } from '../services/UploadService.js';

interface OfProject {
  projectId: string;
}
interface OfBatch {
  batchId: string;
}
type ListQuery = z.output<typeof batchListQuerySchema>;
type Input<P = unknown, Q = unknown, B = unknown> = RouteInput<P, Q, B, Actor>;

export function createBatchController(deps: AppDependencies) {
  const batches = new BatchService(deps);
  const captures = new CaptureService(deps);
  const uploads = new UploadService(deps);
  const limits = { maxFileBytes: deps.config.MAX_FILE_BYTES, maxFiles: uploadLimits.maxFilesPerRequest };

  return {
    listOwn: async ({ actor, query }: Input<unknown, ListQuery>): Promise<Page<BatchDto>> => {
      const { items, nextCursor } = await batches.list(actor, null, query);
      return { items: items.map(presentBatch), nextCursor };
    },

    listOfProject: async ({ actor, params, query }: Input<OfProject, ListQuery>): Promise<Page<BatchDto>> => {
      const { items, nextCursor } = await batches.list(actor, params.projectId, query);
      return { items: items.map(presentBatch), nextCursor };
    },

    create: async ({
      actor,
      params,
      body,
    }: Input<OfProject, unknown, z.output<typeof createBatchSchema>>): Promise<BatchDto> =>
      presentBatch(await batches.create(actor, params.projectId, body)),

    read: async ({ actor, params }: Input<OfBatch>): Promise<BatchDto> =>
      presentBatch(await batches.read(actor, params.batchId)),

    rename: async ({
      actor,
      params,
      body,
    }: Input<OfBatch, unknown, z.output<typeof updateBatchSchema>>): Promise<BatchDto> =>
      presentBatch(await batches.rename(actor, params.batchId, body)),

    complete: async ({ actor, params }: Input<OfBatch>): Promise<BatchDto> =>
      presentBatch(await batches.complete(actor, params.batchId)),

    listCaptures: async ({
      actor,
      params,
      query,
    }: Input<OfBatch, z.output<typeof captureListQuerySchema>>): Promise<Page<CaptureRow>> => {
      const { items, nextCursor } = await captures.list(actor, params.batchId, query);
      return { items: items.map(presentCaptureRow), nextCursor };
    },

    upload: async ({ actor, params, request, response }: Input<OfBatch>): Promise<UploadResponse> => {
      await uploads.requireUploadable(actor, params.batchId);
      return receiveUpload(request, response, deps.storage.temporaryDir, limits, async (upload) =>
        presentUpload(await uploads.accept(actor, params.batchId, upload)),
      );
    },
  };
}
