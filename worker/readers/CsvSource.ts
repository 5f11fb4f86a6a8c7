import { closeSync, openSync, readSync } from 'node:fs';
import { CaptureError } from '../../shared/formats/CaptureError.js';
import { recogniseCsvLayout } from '../../shared/formats/recogniseCsvLayout.js';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';
import { analyseTimeStamps, type TimeStampAnalysis } from './analyseTimeStamps.js';
import { CsvRowParser } from './CsvRowParser.js';
import { forEachLine } from './forEachLine.js';
import { GrowingArray } from './GrowingArray.js';
import type { BlockVisitor, ReadOptions, SampleSource, TimeStampReport } from './SampleSource.js';

const sniffedBytes = 64 * 1024;
const fewestRows = 16;
const defaultBlockFrames = 16_384;
/** Up to this many values the first pass keeps what it read, so that further passes need not parse again. */
const keptValues = 4_000_000;

interface Scan {
  rowCount: number;
  missingCells: number;
  timesS: Float64Array | null;
  firstRowLine: number;
  /** Interleaved values, where they are few enough to keep. */
  values: Float64Array | null;
}

/** A CSV capture: one pass on opening finds rows, stamps and every error; the values then stream from it. */
export class CsvSource implements SampleSource {
  readonly format = 'csv';
  readonly bitsPerSample = null;
  readonly channelCount: number;
  readonly channelNames: string[];
  readonly units: string[];
  readonly sampleRateHz: number | null;
  readonly headerRateHz: number | null;
  readonly frameCount: number;
  /** Rows in the file; frames beyond that are missing rows of a uniform grid, read as NaN. */
  readonly rowCount: number;
  readonly timeStamps: TimeStampReport | null;
  readonly warnings: { code: string; message: string }[] = [];
  readonly layout: CsvLayout;
  private readonly descriptor: number;
  private readonly scale: number;
  private readonly gridIndex: Float64Array | null;
  private readonly kept: Float64Array | null;

  /** @throws CaptureError */
  constructor(filePath: string, sheet: AcquisitionSheet, layout: CsvLayout | null) {
    this.descriptor = openSync(filePath, 'r');
    try {
      this.layout = layout ?? this.recognise();
      const scan = this.scan();
      const analysis = this.analyse(scan);
      this.rowCount = scan.rowCount;
      this.kept = scan.values;
      this.gridIndex = analysis?.gridIndex ?? null;
      this.frameCount = this.gridIndex ? (this.gridIndex.at(-1) ?? 0) + 1 : scan.rowCount;
      this.timeStamps = analysis?.report ?? null;
      this.headerRateHz = analysis?.rateHz ?? this.layout.sampleRateHz;
      this.noteDefects(scan, analysis);
    } catch (error) {
      this.close();
      throw error;
    }
    this.scale = sheet.scale ?? 1;
    this.channelCount = this.layout.valueColumns.length;
    this.channelNames = this.layout.valueColumns.map((column) => this.layout.columnNames[column] ?? '');
    this.units = this.layout.valueColumns.map((_, index) => sheet.unit ?? this.layout.units[index] ?? '');
    this.sampleRateHz = sheet.sampleRateHz ?? this.headerRateHz;
  }

  readBlocks(onBlock: BlockVisitor, { blockFrames = defaultBlockFrames, signal }: ReadOptions = {}): void {
    const channels = Array.from({ length: this.channelCount }, () => new Float64Array(blockFrames));
    let filled = 0;
    let firstFrame = 0;
    const flush = (): void => {
      if (filled === 0) return;
      signal?.throwIfAborted();
      onBlock(
        filled === blockFrames ? channels : channels.map((channel) => channel.subarray(0, filled)),
        filled,
        firstFrame,
      );
      firstFrame += filled;
      filled = 0;
    };
    const push = (values: Float64Array | null, offset: number): void => {
      for (const [index, channel] of channels.entries()) {
        channel[filled] = values ? (values[offset + index] ?? Number.NaN) * this.scale : Number.NaN;
      }
      filled += 1;
      if (filled === blockFrames) flush();
    };
    this.forEachRow((values, offset, row) => {
      const place = this.gridIndex?.[row] ?? row;
      while (firstFrame + filled < place) push(null, 0);
      push(values, offset);
    });
    flush();
  }

  close(): void {
    closeSync(this.descriptor);
  }

  private forEachRow(onRow: (values: Float64Array, offset: number, row: number) => void): void {
    if (this.kept) {
      for (let row = 0; row < this.rowCount; row += 1) onRow(this.kept, row * this.channelCount, row);
      return;
    }
    const parser = new CsvRowParser(this.layout);
    let row = 0;
    forEachLine(this.descriptor, this.layout.encoding, (line, lineNumber) => {
      if (!parser.parse(line, lineNumber)) return;
      onRow(parser.values, 0, row);
      row += 1;
    });
  }

  private recognise(): CsvLayout {
    const bytes = new Uint8Array(sniffedBytes);
    return recogniseCsvLayout(bytes.subarray(0, readSync(this.descriptor, bytes, 0, sniffedBytes, 0)));
  }

  private scan(): Scan {
    const parser = new CsvRowParser(this.layout);
    const times = this.layout.timeColumn === null ? null : new GrowingArray();
    let values: GrowingArray | null = new GrowingArray();
    let rowCount = 0;
    let firstRowLine = 0;
    let textLines = 0;
    forEachLine(this.descriptor, this.layout.encoding, (line, lineNumber) => {
      if (!parser.parse(line, lineNumber)) {
        if (line.trim() !== '') textLines += 1;
        return;
      }
      if (rowCount === 0) firstRowLine = lineNumber;
      rowCount += 1;
      times?.push(parser.timeS);
      if (values && values.length < keptValues) for (const value of parser.values) values.push(value);
      else values = null;
    });
    if (rowCount < fewestRows && textLines > rowCount) {
      throw new CaptureError(
        'NON_NUMERIC',
        `Most lines are no rows of numbers: ${textLines} are text, ${rowCount} are rows.`,
      );
    }
    if (rowCount < fewestRows) {
      throw new CaptureError(
        'TOO_SHORT',
        `Only ${rowCount} rows of numbers were found; at least ${fewestRows} are needed.`,
      );
    }
    return {
      rowCount,
      missingCells: parser.missingCells,
      timesS: times?.view() ?? null,
      firstRowLine,
      values: values?.view() ?? null,
    };
  }

  private analyse({ timesS, firstRowLine }: Scan): TimeStampAnalysis | null {
    return timesS && analyseTimeStamps(timesS, (row) => firstRowLine + row);
  }

  private noteDefects({ missingCells }: Scan, analysis: TimeStampAnalysis | null): void {
    const note = (code: string, message: string): number => this.warnings.push({ code, message });
    if (missingCells > 0) note('MISSING', `${missingCells} cells hold no number; they are treated as missing.`);
    if (analysis?.report.irregular) note('NON_UNIFORM', 'The time stamps do not lie on a uniform grid.');
    if (analysis && analysis.report.missingShare > 0) note('GAP', 'Rows of the uniform time grid are missing.');
  }
}
