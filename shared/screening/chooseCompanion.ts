import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { CaptureState } from '../schemas/capture.js';

/** A capture as the choice sees it. */
export interface PairableCapture {
  id: string;
  /** As uploaded, with its folder. */
  fileName: string;
  /** The batch's sheet with the capture's own values on top. */
  sheet: AcquisitionSheet;
  /** As found by a screening; null before the first. */
  sampleRateHz: number | null;
  state: CaptureState;
}

export interface CompanionChoice<C> {
  companion: C | null;
  /** Why there is none although the sheet asks for one, and what to do. */
  note: string | null;
}

const nothing = { companion: null, note: null };

const lastPart = (fileName: string): string => fileName.slice(fileName.lastIndexOf('/') + 1);
const folderOf = (fileName: string): string => fileName.slice(0, fileName.lastIndexOf('/') + 1);

/** Those that a sheet means by a name: the whole name, else the name in the capture's own folder, else the last part. */
function findNamed<C extends PairableCapture>(name: string, capture: C, candidates: readonly C[]): C[] {
  const beside = folderOf(capture.fileName) + name;
  const meanings = [
    ({ fileName }: C) => fileName === name,
    ({ fileName }: C) => fileName === beside,
    ({ fileName }: C) => lastPart(fileName) === name,
  ];
  return meanings.map((isMeant) => candidates.filter(isMeant)).find((found) => found.length > 0) ?? [];
}

function chooseNamed<C extends PairableCapture>(
  name: string,
  capture: C,
  others: readonly C[],
  elsewhere: readonly C[],
  usedId: string | null,
): CompanionChoice<C> {
  const here = findNamed(name, capture, others);
  if (here.length === 1 && here[0]) return { companion: here[0], note: null };
  if (here.length > 1) return { companion: null, note: severalNamed(name, here.length, 'this batch') };
  // A sheet for the whole batch names the companion to the companion itself, too.
  if (findNamed(name, capture, [capture]).length > 0) return nothing;
  const away = findNamed(name, capture, elsewhere);
  // Names come again: one that joins later must not take away what a result rests on.
  const companion = away.length === 1 ? away[0] : away.find(({ id }) => id === usedId);
  if (companion) return { companion, note: null };
  return {
    companion: null,
    note:
      away.length > 1
        ? severalNamed(name, away.length, 'other batches of the project')
        : `The companion ${name} is not uploaded yet. Once it is, this capture is screened again.`,
  };
}

const severalNamed = (name: string, count: number, where: string): string =>
  `${count} captures in ${where} are called ${name}. Name the companion with its folder, or upload it to this batch.`;

const rateOf = ({ sheet, sampleRateHz }: PairableCapture): number | null => sheet.sampleRateHz ?? sampleRateHz;

/** Of several with the label the fastest, which shows most; it can be told once the rates of all are known. */
function choosePaired<C extends PairableCapture>(label: string, others: readonly C[]): CompanionChoice<C> {
  const labelled = others.filter(({ sheet }) => sheet.pair === label);
  const sound = labelled.filter(({ state }) => state !== 'failed');
  const [first, ...more] = sound.length > 0 ? sound : labelled;
  if (!first) {
    return {
      companion: null,
      note: `No other capture of the batch carries the pair label ${label} yet. Once one does, this capture is screened again.`,
    };
  }
  if (more.some((one) => rateOf(one) === null) || (more.length > 0 && rateOf(first) === null)) {
    const note = `${1 + more.length} other captures carry the pair label ${label}. Once all of them are screened, this capture is compared with the fastest.`;
    return { companion: null, note };
  }
  const companion = more.reduce((best, one) => ((rateOf(one) ?? 0) > (rateOf(best) ?? 0) ? one : best), first);
  return { companion, note: null };
}

/**
 * The only capture of the same logger at the same position at another rate, once the rates of all there are known. When they
 * were recorded is not known here; whether they hold the same event shows when they are aligned.
 */
function findByPlace<C extends PairableCapture>(capture: C, others: readonly C[]): C | null {
  const { logger, position } = capture.sheet;
  const rateHz = rateOf(capture);
  if (!logger || !position || rateHz === null) return null;
  const there = others.filter(
    ({ sheet, state }) => sheet.logger === logger && sheet.position === position && state !== 'failed',
  );
  if (there.some((one) => rateOf(one) === null)) return null;
  const candidates = there.filter((one) => rateOf(one) !== rateHz);
  return candidates.length === 1 ? (candidates[0] ?? null) : null;
}

/**
 * Which capture a capture is compared with: the one that its sheet names, in its batch and then in its project; else the
 * other one with its pair label; else, where the sheet says neither, the one recorded by the same logger at the same position
 * at another rate, if there is exactly one. It follows from sheets, names and rates only, never from the outcome of a
 * comparison, so that asking again after a screening gives the same answer.
 * @param batch captures of the batch; the capture itself may be among them
 * @param elsewhere captures of the same project in other batches
 * @param usedId the companion that the capture's results were made with
 */
export function chooseCompanion<C extends PairableCapture>(
  capture: C,
  { batch, elsewhere, usedId }: { batch: readonly C[]; elsewhere: readonly C[]; usedId: string | null },
): CompanionChoice<C> {
  const others = batch.filter(({ id }) => id !== capture.id);
  const { companion: name, pair: label } = capture.sheet;
  const named = name ? chooseNamed(name, capture, others, elsewhere, usedId) : nothing;
  if (named.companion) return named;
  const paired = label ? choosePaired(label, others) : nothing;
  if (paired.companion) return paired;
  if (name || label) return { companion: null, note: named.note ?? paired.note };
  return { companion: findByPlace(capture, others), note: null };
}

/** Whether a sheet gives any reason to look for a companion. */
export const asksForCompanion = ({ companion, pair, logger, position }: AcquisitionSheet): boolean =>
  Boolean(companion) || Boolean(pair) || Boolean(logger && position);
