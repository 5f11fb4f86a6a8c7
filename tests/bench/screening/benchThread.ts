import { CaptureError } from '../../../shared/formats/CaptureError.js';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { judgeCapture } from '../../../shared/screening/judgeCapture.js';
import { openCapture } from '../../../worker/readers/openCapture.js';
import { screenFile } from '../../../worker/screenFile.js';
import { type SimpleLevels, simpleLevels } from '../simple/simpleMethods.js';
import type { BenchResult, BenchTask } from './ScreenedCapture.js';

/** Entry of a computing thread: screens one file as the command does, without a sheet. A file that can't be read is a result too. */
export function benchThread(task: BenchTask): BenchResult {
  const startedMs = performance.now();
  try {
    const { screens } = screenFile(task.path, {
      fileName: task.file,
      sheet: {},
      thresholds: defaultThresholds,
      companion: task.companion && { ...task.companion, sheet: {} },
    });
    const elapsedMs = performance.now() - startedMs;
    const capture = judgeCapture(screens);
    const first = screens[0];
    const ratios = screens.map(({ foldLogLikelihoodRatio }) => foldLogLikelihoodRatio).filter((one) => one !== null);
    return {
      failure: null,
      verdict: capture.verdict,
      headline: capture.headline,
      foldScore: capture.foldScore,
      logRatio: ratios.length === 0 ? null : Math.max(...ratios),
      prior: first?.foldPrior ?? 0.5,
      clearToHz: capture.clearToHz,
      protectionDb: first?.protectionDb ?? defaultThresholds.requiredProtectionDb,
      durationS: first?.durationS ?? null,
      tones: (first?.tones ?? []).map(({ frequencyHz, explanation, trueFrequencyHz, confidence }) => ({
        frequencyHz,
        explanation,
        ...(trueFrequencyHz === undefined ? {} : { trueFrequencyHz }),
        confidence,
      })),
      findings: screens.flatMap(({ findings }) =>
        findings.map(({ kind, severity, confidence, evidence, text }) => ({
          kind,
          severity,
          confidence,
          evidence,
          text,
        })),
      ),
      simple: readSimpleLevels(task.path),
      elapsedMs,
    };
  } catch (error) {
    // Anything but a bad file is a fault of the engine: it is counted as "not screened" and named in the list.
    const failure = error instanceof CaptureError ? `${error.code}: ${error.message}` : String(error);
    return {
      failure,
      verdict: null,
      headline: null,
      foldScore: null,
      logRatio: null,
      prior: 0.5,
      clearToHz: null,
      protectionDb: defaultThresholds.requiredProtectionDb,
      durationS: null,
      tones: [],
      findings: [],
      simple: null,
      elapsedMs: performance.now() - startedMs,
    };
  }
}

/** The simple methods see the first channel's samples and the rate, nothing of what the engine measured. */
function readSimpleLevels(path: string): SimpleLevels | null {
  const source = openCapture(path, {});
  try {
    if (source.sampleRateHz === null || source.timeStamps?.irregular) return null;
    const samples = new Float64Array(source.frameCount);
    source.readBlocks((channels, frames, firstFrame) => {
      samples.set((channels[0] as Float64Array).subarray(0, frames), firstFrame);
    });
    return samples.every(Number.isFinite) ? simpleLevels(samples, source.sampleRateHz) : null;
  } finally {
    source.close();
  }
}

export default benchThread;
