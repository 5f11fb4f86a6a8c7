import {
  acquisitionSheetSchema,
  type AcquisitionSheet,
  type AntiAliasFilter,
} from '@shared/schemas/acquisitionSheet.js';

/** The sheet as a form holds it: text, empty where nothing is known. */
export interface SheetDraft {
  sampleRateHz: string;
  lowestFrequencyHz: string;
  highestFrequencyHz: string;
  sensorBandHz: string;
  sensorResonanceHz: string;
  filterType: AntiAliasFilter['type'];
  filterOrder: string;
  filterCornerHz: string;
  sources: string;
  nominalSpeedHz: string;
  supplyHz: string;
  unit: string;
  scale: string;
  logger: string;
  position: string;
  companion: string;
  pair: string;
  notes: string;
}

const numberFields = [
  'sampleRateHz',
  'lowestFrequencyHz',
  'highestFrequencyHz',
  'sensorBandHz',
  'sensorResonanceHz',
  'nominalSpeedHz',
  'supplyHz',
  'scale',
] as const;
const textFields = ['unit', 'logger', 'position', 'companion', 'pair', 'notes'] as const;

const text = (value: number | string | undefined): string => (value === undefined ? '' : String(value));

export function toDraft(sheet: AcquisitionSheet): SheetDraft {
  const plain = Object.fromEntries([...numberFields, ...textFields].map((name) => [name, text(sheet[name])]));
  return {
    ...(plain as Record<(typeof numberFields)[number] | (typeof textFields)[number], string>),
    filterType: sheet.filter?.type ?? 'unknown',
    filterOrder: text(sheet.filter?.order),
    filterCornerHz: text(sheet.filter?.cornerHz),
    sources: (sheet.sources ?? []).map(({ frequencyHz }) => frequencyHz).join(' '),
  };
}

const isFilled = (value: string): boolean => value.trim() !== '';
/** A decimal comma is what many people type. */
const toNumber = (value: string): number => Number(value.trim().replace(',', '.'));

function filterOf(draft: SheetDraft): Record<string, unknown> {
  const isKnown = draft.filterType !== 'unknown' || isFilled(draft.filterOrder) || isFilled(draft.filterCornerHz);
  if (!isKnown) return {};
  return {
    filter: {
      type: draft.filterType,
      ...(isFilled(draft.filterOrder) ? { order: toNumber(draft.filterOrder) } : {}),
      ...(isFilled(draft.filterCornerHz) ? { cornerHz: toNumber(draft.filterCornerHz) } : {}),
    },
  };
}

export interface ParsedDraft {
  sheet: AcquisitionSheet | null;
  /** Field name -> what is wrong with it. */
  problems: Record<string, string>;
}

/** Reads a draft; what the form doesn't show (`kept`) stays as it was. */
export function parseDraft(draft: SheetDraft, kept: AcquisitionSheet = {}): ParsedDraft {
  const numbers = numberFields.filter((name) => isFilled(draft[name])).map((name) => [name, toNumber(draft[name])]);
  const texts = textFields.filter((name) => isFilled(draft[name])).map((name) => [name, draft[name].trim()]);
  const sources = isFilled(draft.sources)
    ? {
        sources: draft.sources
          .trim()
          .split(/[\s;]+/)
          .map((value) => sourceOf(toNumber(value), kept)),
      }
    : {};
  const hidden = {
    ...(kept.noiseFloorDb === undefined ? {} : { noiseFloorDb: kept.noiseFloorDb }),
  };
  const parsed = acquisitionSheetSchema.safeParse({
    ...hidden,
    ...Object.fromEntries([...numbers, ...texts]),
    ...filterOf(draft),
    ...sources,
  });
  if (parsed.success) return { sheet: parsed.data, problems: {} };
  const problems: Record<string, string> = {};
  for (const issue of parsed.error.issues) {
    const [first, second] = issue.path;
    const field =
      first === 'filter' ? `filter${String(second).charAt(0).toUpperCase()}${String(second).slice(1)}` : String(first);
    problems[field] ??= issue.message;
  }
  return { sheet: null, problems };
}

/** A source keeps the name it had. */
function sourceOf(frequencyHz: number, kept: AcquisitionSheet) {
  return kept.sources?.find((source) => source.frequencyHz === frequencyHz) ?? { frequencyHz };
}
