import { writeFileSync } from "node:fs";

const NAME_WIDTH = 82;

export type Figure = { name: string; value: number; unit: string };
export type Bar = { name: string; value: number; bar: number; met: boolean };

/** Collects what a bench run measured, prints it as it comes, and writes it out when asked. */
export class Report {
  readonly figures: Figure[] = [];
  readonly bars: Bar[] = [];

  figure(name: string, value: number, unit: string): void {
    this.figures.push({ name, value, unit });
    process.stdout.write(`  ${name.padEnd(NAME_WIDTH)} ${format(value)} ${unit}\n`);
  }

  /** A ratio with the least (or, with `below`, the greatest) value it is held to. */
  bar(name: string, value: number, bar: number, sense: "above" | "below" = "above"): void {
    const met = sense === "above" ? value >= bar : value < bar;
    this.bars.push({ name, value, bar, met });
    const verdict = met ? "met" : "NOT met";
    process.stdout.write(
      `  ${name.padEnd(NAME_WIDTH)} ${format(value)} (${sense} ${format(bar)}: ${verdict})\n`,
    );
  }

  /** A sentence about the figures before it. */
  note(text: string): void {
    process.stdout.write(`  ${text}\n`);
  }

  heading(text: string): void {
    process.stdout.write(`\n${text}\n`);
  }

  write(file: string): void {
    writeFileSync(file, `${JSON.stringify({ figures: this.figures, bars: this.bars }, null, 2)}\n`);
  }
}

function format(value: number): string {
  const text = value >= 1000 ? Math.round(value).toLocaleString("en-US") : value.toPrecision(3);
  return text.padStart(14);
}

/** The middle value of several runs of the same work. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

/** The value that so large a share of the values does not exceed (nearest rank). */
export function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)];
}
