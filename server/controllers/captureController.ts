import type { z } from 'zod';
import type {
  CaptureDto,
  CaptureRow,
  PutAcquisition,
  reviewQuerySchema,
  SpectrumDto,
  spectrumQuerySchema,
} from '../../shared/schemas/capture.js';
import type { Page } from '../../shared/schemas/common.js';
import type { PutDecision } from '../../shared/schemas/decision.js';
import type { StartPage } from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';
import type { Actor } from '../policies/Actor.js';
import { presentCapture } from '../presenters/presentCapture.js';
import { presentCaptureRow } from '../presenters/presentCaptureRow.js';
import { presentNoSpectrum, presentSpectrum } from '../presenters/presentSpectrum.js';
import type { RouteInput } from '../routes/Route.js';
import { CaptureEditService } from '../services/CaptureEditService.js';
import { CaptureService } from '../services/CaptureService.js';
import { DecisionService } from '../services/DecisionService.js';
import { ReviewService } from '../services/ReviewService.js';
import { sendAttachment } from './sendAttachment.js';

interface OfCapture {
  captureId: string;
}
type Input<P = unknown, Q = unknown, B = unknown> = RouteInput<P, Q, B, Actor>;

const contentTypes = { wav: 'audio/wav', csv: 'text/csv; charset=utf-8' } as const;

export function createCaptureController(deps: AppDependencies) {
  const captures = new CaptureService(deps);
  const edits = new CaptureEditService(deps);
  const decisions = new DecisionService(deps);
  const review = new ReviewService(deps);

  const present = async (actor: Actor, captureId: string): Promise<CaptureDto> =>
    presentCapture(await captures.read(actor, captureId));

  return {
    start: ({ actor }: Input): Promise<StartPage> => review.countWaiting(actor),

    review: async ({ actor, query }: Input<unknown, z.output<typeof reviewQuerySchema>>): Promise<Page<CaptureRow>> => {
      const { items, nextCursor } = await review.list(actor, query);
      return { items: items.map(presentCaptureRow), nextCursor };
    },

    read: ({ actor, params }: Input<OfCapture>): Promise<CaptureDto> => present(actor, params.captureId),

    spectrum: async ({
      actor,
      params,
      query,
    }: Input<OfCapture, z.output<typeof spectrumQuerySchema>>): Promise<SpectrumDto> => {
      const { spectrum, screen } = await captures.readSpectrum(actor, params.captureId, query);
      const { channel, unit = '', sampleRateHz } = screen;
      const of = { channel, kind: query.kind, unit, sampleRateHz };
      return spectrum ? presentSpectrum(spectrum, of, query) : presentNoSpectrum(of);
    },

    file: async ({ actor, params, response }: Input<OfCapture>): Promise<void> => {
      const { capture, content } = await captures.openFile(actor, params.captureId);
      await sendAttachment(response, {
        fileName: capture.fileName.slice(capture.fileName.lastIndexOf('/') + 1),
        contentType: contentTypes[capture.format],
        sizeBytes: capture.sizeBytes,
        content,
      });
    },

    changeAcquisition: async ({
      actor,
      params,
      body,
    }: Input<OfCapture, unknown, PutAcquisition>): Promise<CaptureDto> => {
      await edits.changeAcquisition(actor, params.captureId, body);
      return present(actor, params.captureId);
    },

    retry: async ({ actor, params }: Input<OfCapture>): Promise<CaptureDto> => {
      await edits.retry(actor, params.captureId);
      return present(actor, params.captureId);
    },

    decide: async ({ actor, params, body }: Input<OfCapture, unknown, PutDecision>): Promise<CaptureDto> => {
      await decisions.decide(actor, params.captureId, body);
      return present(actor, params.captureId);
    },
  };
}
