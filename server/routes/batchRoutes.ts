import { z } from 'zod';
import {
  batchListQuerySchema,
  batchPageSchema,
  batchSchema,
  createBatchSchema,
  updateBatchSchema,
} from '../../shared/schemas/batch.js';
import { captureListQuerySchema, capturePageSchema, uploadResponseSchema } from '../../shared/schemas/capture.js';
import { idSchema } from '../../shared/schemas/common.js';
import type { AppDependencies } from '../AppDependencies.js';
import { createBatchController } from '../controllers/batchController.js';
import { route, type Route } from './Route.js';

const ofProject = z.strictObject({ projectId: idSchema });
const params = z.strictObject({ batchId: idSchema });

export function batchRoutes(deps: AppDependencies): Route[] {
  const controller = createBatchController(deps);
  const tag = 'Batches';
  return [
    route({
      method: 'get',
      path: '/batches',
      tag,
      summary: 'Batches of all own projects, newest first',
      access: 'signedIn',
      query: batchListQuerySchema,
      success: { status: 200, schema: batchPageSchema },
      handle: controller.listOwn,
    }),
    route({
      method: 'get',
      path: '/projects/:projectId/batches',
      tag,
      summary: 'Batches of one project, newest first',
      access: 'signedIn',
      params: ofProject,
      query: batchListQuerySchema,
      success: { status: 200, schema: batchPageSchema },
      errors: { 404: 'NOT_FOUND' },
      handle: controller.listOfProject,
    }),
    route({
      method: 'post',
      path: '/projects/:projectId/batches',
      tag,
      summary: 'Open a batch (analysts)',
      access: 'signedIn',
      params: ofProject,
      body: createBatchSchema,
      success: { status: 201, schema: batchSchema },
      errors: { 403: 'FORBIDDEN', 404: 'NOT_FOUND', 409: 'PROJECT_ARCHIVED' },
      handle: controller.create,
    }),
    route({
      method: 'get',
      path: '/batches/:batchId',
      tag,
      summary: 'One batch with its counts per verdict',
      access: 'signedIn',
      params,
      success: { status: 200, schema: batchSchema },
      errors: { 404: 'NOT_FOUND' },
      handle: controller.read,
    }),
    route({
      method: 'patch',
      path: '/batches/:batchId',
      tag,
      summary: 'Rename a batch (analysts)',
      access: 'signedIn',
      params,
      body: updateBatchSchema,
      success: { status: 200, schema: batchSchema },
      errors: { 403: 'FORBIDDEN', 404: 'NOT_FOUND', 409: 'BATCH_CLOSED' },
      handle: controller.rename,
    }),
    route({
      method: 'post',
      path: '/batches/:batchId/captures',
      tag,
      summary: 'Upload captures into a batch (analysts)',
      description:
        'Screening of a file begins as soon as it is received. Each file is accepted or refused by itself: `refused` says why. The same name with the same bytes answers the capture that is there, so that a request may be repeated.',
      access: 'signedIn',
      params,
      bodyType: 'multipart',
      multipartFields: {
        files: { description: 'WAV or CSV files; a name may carry folders', isFile: true, isRequired: true },
        acquisition: { description: 'JSON: file name -> acquisition sheet, over the values of the batch' },
        csvLayout: { description: 'JSON: file name -> layout, where the recognised one is wrong' },
        replaces: { description: 'Id of a failed capture of this batch that the one file takes the place of' },
      },
      success: { status: 201, schema: uploadResponseSchema },
      errors: {
        400: 'NO_FILES, ONE_FILE_ONLY, BAD_UPLOAD, UNEXPECTED_FILE, INVALID_INPUT',
        403: 'FORBIDDEN',
        404: 'NOT_FOUND',
        409: 'BATCH_COMPLETE, BATCH_CLOSED, NOT_FAILED',
        413: 'FILE_TOO_LARGE, TOO_MANY_FILES, FIELD_TOO_LARGE',
        415: 'UNSUPPORTED_MEDIA_TYPE',
        507: 'STORAGE_FULL',
      },
      handle: controller.upload,
    }),
    route({
      method: 'post',
      path: '/batches/:batchId/complete',
      tag,
      summary: 'Close the upload; repeating it changes nothing (analysts)',
      access: 'signedIn',
      params,
      success: { status: 200, schema: batchSchema },
      errors: { 403: 'FORBIDDEN', 404: 'NOT_FOUND', 409: 'BATCH_EMPTY, BATCH_CLOSED' },
      handle: controller.complete,
    }),
    route({
      method: 'get',
      path: '/batches/:batchId/captures',
      tag,
      summary: 'Captures of a batch in the order of their upload',
      access: 'signedIn',
      params,
      query: captureListQuerySchema,
      success: { status: 200, schema: capturePageSchema },
      errors: { 404: 'NOT_FOUND' },
      handle: controller.listCaptures,
    }),
  ];
}
