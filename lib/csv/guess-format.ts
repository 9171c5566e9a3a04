import type { DayOrder } from "./read-instant";
import { DELIMITERS, type Delimiter, readTable, type Table } from "./read-table";

/** How a file writes: told by the person, guessed before. */
export interface FileFormat {
  readonly delimiter: Delimiter;
  readonly decimal: "." | ",";
  readonly dayOrder: DayOrder;
}

const SAMPLE_LINES = 200;

/** Guesses from the first rows; the person sees the guess and can say otherwise. */
export function guessFormat(text: string): FileFormat {
  const delimiter = guessDelimiter(text);
  const table = readTable(sampleOf(text), delimiter);
  const cells = table.rows.flatMap((row) => row.cells);
  return { delimiter, decimal: guessDecimal(cells, delimiter), dayOrder: guessDayOrder(cells) };
}

/** Whole lines only, so that no quoted field is torn more than once. */
function sampleOf(text: string): string {
  const lines = text.split(/\r\n|\n|\r/, SAMPLE_LINES + 1);
  const sample = lines.slice(0, SAMPLE_LINES).join("\n");
  // An odd number of quotes: the sample ends inside a field; leave its last record open-ended.
  return (sample.match(/"/g)?.length ?? 0) % 2 === 1 ? `${sample}"` : sample;
}

/** The delimiter that gives most columns, the same number in most rows. */
function guessDelimiter(text: string): Delimiter {
  const sample = sampleOf(text);
  const scores = DELIMITERS.map((delimiter) => ({
    delimiter,
    score: evenness(readTable(sample, delimiter)),
  }));
  return scores.reduce((best, next) => (next.score > best.score ? next : best)).delimiter;
}

function evenness({ head, rows, trouble }: Table): number {
  if (trouble || head.length < 2) return 0;
  const alike = rows.filter((row) => row.cells.length === head.length).length;
  return head.length * ((alike + 1) / (rows.length + 1));
}

/** With ";" between fields a comma in numbers is likely; with "," it needs quotes. */
function guessDecimal(cells: readonly string[], delimiter: Delimiter): "." | "," {
  const count = (pattern: RegExp) => cells.filter((cell) => pattern.test(cell.trim())).length;
  const commas = count(/^[+-]?\d+,\d+$/);
  const points = count(/^[+-]?\d+\.\d+$/);
  if (commas === points) return delimiter === ";" ? "," : ".";
  return commas > points ? "," : ".";
}

function guessDayOrder(cells: readonly string[]): DayOrder {
  const parts = cells
    .map((cell) => /^(\d{1,2})[-/.](\d{1,2})[-/.]\d{4}\b/.exec(cell.trim()))
    .filter((match) => match !== null);
  if (parts.length === 0) return "year-first";
  return parts.some((match) => Number(match[2]) > 12) ? "month-first" : "day-first";
}
