/** Comma-separated text with quoted cells (RFC 4180) as rows of cells. */
export function parseCsv(text: string): string[][] {
  const rows: string[][] = [];
  let row: string[] = [];
  let cell = '';
  let quoted = false;
  for (let n = 0; n < text.length; n++) {
    const sign = text[n] as string;
    if (quoted) {
      if (sign === '"' && text[n + 1] === '"') {
        cell += '"';
        n++;
      } else if (sign === '"') quoted = false;
      else cell += sign;
    } else if (sign === '"') quoted = true;
    else if (sign === ',') {
      row.push(cell);
      cell = '';
    } else if (sign === '\n') {
      rows.push([...row, cell]);
      row = [];
      cell = '';
    } else if (sign !== '\r') cell += sign;
  }
  if (cell !== '' || row.length > 0) rows.push([...row, cell]);
  return rows;
}
