import type { Readable } from 'node:stream';
import type { z } from 'zod';
import type { captureListQuerySchema, spectrumQuerySchema } from '../../shared/schemas/capture.js';
import type { ChannelScreen } from '../../shared/schemas/screening.js';
import type { AppDependencies } from '../AppDependencies.js';
import { AuditEntry, Batch, Capture, ChannelResult, Decision, Spectrum } from '../entities/index.js';
import { ConflictError, GoneError, NotFoundError, type AppError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { refuseDecision, refuseEdit } from '../policies/capturePolicy.js';
import { requireProjectReader } from '../policies/requireProjectAccess.js';
import {
  captureOrders,
  findCaptureDetail,
  findCaptures,
  type CaptureDetailRow,
} from '../repositories/captureRepository.js';
import { cutPage, pageCursor } from '../repositories/pageCursor.js';
import { StoredFileMissingError } from '../storage/StoredFileMissingError.js';

export interface CaptureDetail {
  row: CaptureDetailRow;
  /** Empty unless the capture is screened: results of an earlier screening are not those of the sheet shown. */
  screens: ChannelScreen[];
  decisions: Decision[];
  history: AuditEntry[];
  decideRefusal: AppError | null;
  editRefusal: AppError | null;
}

/** Reading of captures. */
export class CaptureService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource' | 'storage'>) {}

  /** Captures of one batch, in the order of their upload. */
  async list(actor: Actor, batchId: string, query: z.output<typeof captureListQuerySchema>) {
    const batch = await this.deps.dataSource.manager.findOneBy(Batch, { id: batchId });
    if (!batch) throw new NotFoundError();
    requireProjectReader(actor, batch.projectId);
    const order = 'oldest';
    const rows = await findCaptures(this.deps.dataSource, {
      order,
      after: pageCursor.decode(query.cursor, order, captureOrders[order].kind),
      limit: query.limit + 1,
      batchId,
      state: query.state,
      verdict: query.verdict,
    });
    return cutPage(rows, query.limit, order);
  }

  /** Everything about one capture. */
  async read(actor: Actor, captureId: string): Promise<CaptureDetail> {
    const { manager } = this.deps.dataSource;
    const row = await findCaptureDetail(manager, captureId);
    if (!row) throw new NotFoundError();
    requireProjectReader(actor, row.projectId);
    const [screens, decisions, history] = await Promise.all([
      row.state === 'screened'
        ? manager.find(ChannelResult, {
            select: { id: true, screen: true },
            where: { captureId },
            order: { channelIndex: 'ASC' },
          })
        : [],
      manager.find(Decision, { where: { captureId }, order: { version: 'DESC' }, relations: { decidedBy: true } }),
      manager.find(AuditEntry, {
        where: { entityType: 'capture', entityId: captureId },
        order: { createdAt: 'ASC', id: 'ASC' },
      }),
    ]);
    return {
      row,
      screens: screens.map(({ screen }) => screen),
      decisions,
      history,
      decideRefusal: refuseDecision(actor, row, row),
      editRefusal: refuseEdit(actor, row),
    };
  }

  /** A channel that is too short or irregular has no spectrum: null. */
  async readSpectrum(actor: Actor, captureId: string, query: z.output<typeof spectrumQuerySchema>) {
    const capture = await this.load(actor, captureId);
    if (capture.state !== 'screened') {
      throw new ConflictError('NOT_SCREENED', 'There is no spectrum of this capture: it has not been screened.');
    }
    const { manager } = this.deps.dataSource;
    const channelIndex = query.channel;
    const result = await manager.findOne(ChannelResult, {
      select: { id: true, screen: true },
      where: { captureId, channelIndex },
    });
    if (!result) throw new NotFoundError('NO_CHANNEL', `This capture has no channel ${channelIndex}.`);
    const spectrum = await manager.findOneBy(Spectrum, { channelResultId: result.id, kind: query.kind });
    return { spectrum, screen: result.screen };
  }

  /** The file as it was uploaded. */
  async openFile(actor: Actor, captureId: string): Promise<{ capture: Capture; content: Readable }> {
    const capture = await this.load(actor, captureId);
    try {
      return { capture, content: await this.deps.storage.openReadStream(capture.storageKey) };
    } catch (error) {
      if (!(error instanceof StoredFileMissingError)) throw error;
      throw new GoneError('FILE_MISSING', 'The stored file is gone. Tell an administrator, or upload it again.', {
        cause: error,
      });
    }
  }

  private async load(actor: Actor, captureId: string): Promise<Capture> {
    const capture = await this.deps.dataSource.manager.findOneBy(Capture, { id: captureId });
    if (!capture) throw new NotFoundError();
    requireProjectReader(actor, capture.projectId);
    return capture;
  }
}
