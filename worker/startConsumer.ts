import { UnrecoverableError, Worker, type Job } from 'bullmq';
import { Redis } from 'ioredis';
import { finishBatch } from '../server/queues/finishBatch.js';
import { failCapture } from '../server/repositories/failCapture.js';
import { Capture } from '../server/entities/index.js';
import { screenCapturePayloadSchema, screeningQueueName } from '../shared/jobs/screenCapture.js';
import { isJobName, registry } from './registry.js';
import type { WorkerContext } from './WorkerContext.js';

/** A lost worker is found this often; with the lock's length that bounds how long its jobs rest. */
const stalledIntervalMs = 5_000;
/** How often a job may lose its worker before BullMQ gives it up; the reconciler counts again across attempts. */
const maxStalledCount = 3;
const longestReconnectPauseMs = 2_000;

async function processJob(job: Job, context: WorkerContext, signal: AbortSignal): Promise<void> {
  if (!isJobName(job.name)) throw new UnrecoverableError(`There is no processor for jobs named ${job.name}.`);
  const { payloadSchema, process } = registry[job.name];
  const payload = payloadSchema.safeParse(job.data);
  if (!payload.success)
    throw new UnrecoverableError(`The payload of job ${job.id ?? '?'} is not what ${job.name} takes.`);
  await process(payload.data, context, signal);
}

/** After the last try of a passing fault the capture says so, and can be retried by a person. */
async function handleFailure(job: Job | undefined, error: Error, context: WorkerContext): Promise<void> {
  const { dataSource, logger, config } = context;
  const isFinal = error instanceof UnrecoverableError || (job?.attemptsMade ?? 0) >= (job?.opts.attempts ?? 1);
  if (!job || !isFinal) {
    logger.warn({ jobId: job?.id, err: error }, 'screening failed, will be tried again');
    return;
  }
  const payload = screenCapturePayloadSchema.safeParse(job.data);
  if (!payload.success) return;
  const changed = await failCapture(dataSource, payload.data, {
    code: 'SCREENING_FAULT',
    message:
      'Screening was tried several times and stopped each time for a reason that does not lie in the file. Retry it; if it fails again, tell whoever runs this installation.',
    line: null,
  });
  if (!changed) {
    logger.info({ jobId: job.id, reason: error.message }, 'capture could not be screened');
    return;
  }
  logger.error({ jobId: job.id, err: error }, 'screening given up');
  const capture = await dataSource.getRepository(Capture).findOneBy({ id: payload.data.captureId });
  if (capture) await finishBatch(dataSource, config, capture.batchId);
}

/** The queue's consumer: takes jobs by name, parses their payload and hands them to their processor. */
export function startConsumer(context: WorkerContext): Worker {
  const { config, logger } = context;
  const connection = new Redis(config.REDIS_URL, {
    maxRetriesPerRequest: null,
    retryStrategy: (tries) => Math.min(longestReconnectPauseMs, 100 * tries),
  });
  connection.on('error', (error) => logger.warn({ err: error.message }, 'queue not reachable'));
  const consumer = new Worker(
    screeningQueueName,
    (job, _token, signal) => processJob(job, context, signal ?? new AbortController().signal),
    {
      connection,
      concurrency: config.WORKER_CONCURRENCY,
      lockDuration: config.JOB_LOCK_MS,
      stalledInterval: stalledIntervalMs,
      maxStalledCount,
    },
  );
  consumer.on('error', (error) => logger.warn({ err: error.message }, 'queue fault'));
  consumer.on('failed', (job, error) => {
    handleFailure(job, error, context).catch((fault: unknown) => {
      // The reconciler finds the row without a live job and puts it right.
      logger.error({ err: fault, jobId: job?.id }, 'failure could not be recorded');
    });
  });
  consumer.on('closed', () => connection.disconnect());
  return consumer;
}
