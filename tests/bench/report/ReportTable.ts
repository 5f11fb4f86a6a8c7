/** One table of the report, as text: the same for the terminal and for the documents. */
export interface ReportTable {
  title: string;
  columns: string[];
  rows: string[][];
  notes: string[];
}
