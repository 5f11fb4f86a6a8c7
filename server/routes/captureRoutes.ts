import { z } from 'zod';
import {
  capturePageSchema,
  captureSchema,
  putAcquisitionSchema,
  reviewQuerySchema,
  spectrumQuerySchema,
  spectrumSchema,
} from '../../shared/schemas/capture.js';
import { idSchema } from '../../shared/schemas/common.js';
import { putDecisionSchema } from '../../shared/schemas/decision.js';
import { startPageSchema } from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';
import { createCaptureController } from '../controllers/captureController.js';
import { route, type Route } from './Route.js';

const params = z.strictObject({ captureId: idSchema });

export function captureRoutes(deps: AppDependencies): Route[] {
  const controller = createCaptureController(deps);
  const tag = 'Captures';
  return [
    route({
      method: 'get',
      path: '/start',
      tag: 'Review',
      summary: 'What waits in the own projects',
      access: 'signedIn',
      success: { status: 200, schema: startPageSchema },
      handle: controller.start,
    }),
    route({
      method: 'get',
      path: '/review',
      tag: 'Review',
      summary: 'Screened captures of the own projects, by what they wait for',
      access: 'signedIn',
      query: reviewQuerySchema,
      success: { status: 200, schema: capturePageSchema },
      handle: controller.review,
    }),
    route({
      method: 'get',
      path: '/captures/:captureId',
      tag,
      summary: 'One capture with channels, findings, decisions and history',
      access: 'signedIn',
      params,
      success: { status: 200, schema: captureSchema },
      errors: { 404: 'NOT_FOUND' },
      handle: controller.read,
    }),
    route({
      method: 'get',
      path: '/captures/:captureId/spectrum',
      tag,
      summary: 'Power spectral density of one channel, pooled to a number of points',
      access: 'signedIn',
      params,
      query: spectrumQuerySchema,
      success: { status: 200, schema: spectrumSchema },
      errors: { 404: 'NOT_FOUND, NO_CHANNEL', 409: 'NOT_SCREENED' },
      handle: controller.spectrum,
    }),
    route({
      method: 'get',
      path: '/captures/:captureId/file',
      tag,
      summary: 'The file as it was uploaded',
      access: 'signedIn',
      params,
      success: { status: 200, contentType: 'application/octet-stream', description: 'The bytes, as an attachment' },
      errors: { 404: 'NOT_FOUND', 410: 'FILE_MISSING' },
      handle: controller.file,
    }),
    route({
      method: 'put',
      path: '/captures/:captureId/acquisition',
      tag,
      summary: 'Replace the values set for this capture (analysts)',
      description:
        'Judged again at once from the stored measurement; screened again only where the measurement itself used what has changed (rate, scale, unit, CSV layout).',
      access: 'signedIn',
      params,
      body: putAcquisitionSchema,
      success: { status: 200, schema: captureSchema },
      errors: { 403: 'FORBIDDEN', 404: 'NOT_FOUND', 409: 'BATCH_CLOSED' },
      handle: controller.changeAcquisition,
    }),
    route({
      method: 'post',
      path: '/captures/:captureId/retry',
      tag,
      summary: 'Screen a failed capture once more (analysts)',
      access: 'signedIn',
      params,
      success: { status: 200, schema: captureSchema },
      errors: { 403: 'FORBIDDEN', 404: 'NOT_FOUND', 409: 'NOT_FAILED, BATCH_CLOSED' },
      handle: controller.retry,
    }),
    route({
      method: 'put',
      path: '/captures/:captureId/decision',
      tag,
      summary: 'Decide on a capture (reviewers)',
      description:
        'State the `decisionVersion` you saw as `version`: if somebody else has decided since, the answer is 409. Earlier decisions are kept.',
      access: 'signedIn',
      params,
      body: putDecisionSchema,
      success: { status: 200, schema: captureSchema },
      errors: {
        403: 'FORBIDDEN, INDEPENDENT_REVIEW',
        404: 'NOT_FOUND',
        409: 'NOT_SCREENED, DECISION_CHANGED, BATCH_CLOSED',
        422: 'LIMIT_ABOVE_FOLDING',
      },
      handle: controller.decide,
    }),
  ];
}
