import { readSync } from 'node:fs';
import { CaptureError } from '../../shared/formats/CaptureError.js';
import type { CsvEncoding } from '../../shared/formats/csvText.js';

const blockBytes = 256 * 1024;
const longestLine = 1024 * 1024;

/**
 * Calls back for every line of an open file, in order, whatever ends it (CR, LF, CRLF); one block in memory at a time.
 * @throws CaptureError LINE_TOO_LONG, BINARY
 */
export function forEachLine(
  descriptor: number,
  encoding: CsvEncoding,
  onLine: (line: string, lineNumber: number) => void,
): void {
  const decoder = new TextDecoder(encoding);
  const block = new Uint8Array(blockBytes);
  let rest = '';
  let lineNumber = 0;
  let position = 0;
  const emit = (line: string): void => {
    lineNumber += 1;
    if (line.includes('\0')) {
      throw new CaptureError(
        'BINARY',
        `Line ${lineNumber} holds NUL bytes: this is not a plain table. Export it again.`,
        {
          line: lineNumber,
        },
      );
    }
    onLine(line, lineNumber);
  };
  for (let read = -1; read !== 0;) {
    read = readSync(descriptor, block, 0, blockBytes, position);
    position += read;
    const text = rest + decoder.decode(block.subarray(0, read), { stream: read > 0 });
    // A CR at the end may be the first half of CRLF: keep it for the next block.
    const usable = read > 0 && text.endsWith('\r') ? text.slice(0, -1) : text;
    const lines = usable.split(/\r\n|\n|\r/);
    rest = (lines.pop() ?? '') + text.slice(usable.length);
    if (rest.length > longestLine) {
      throw new CaptureError('LINE_TOO_LONG', `Line ${lineNumber + 1} is longer than ${longestLine} characters.`, {
        line: lineNumber + 1,
      });
    }
    lines.forEach(emit);
  }
  if (rest !== '') emit(rest);
}
