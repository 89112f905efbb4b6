import { readFileSync } from 'node:fs';

/** A tolerance of a reference case: accept |got − expected| ≤ abs + rel·|expected|. */
export interface Tolerance {
  abs: number;
  rel: number;
}

/** One case of a reference file (see README.md beside it for the conventions). */
export interface ReferenceCase<Inputs, Outputs> {
  id: string;
  source: string;
  tolerance: Tolerance;
  inputs: Inputs;
  outputs: Outputs;
}

function revive(_key: string, value: unknown): unknown {
  if (value === 'Infinity') return Infinity;
  if (value === '-Infinity') return -Infinity;
  return value;
}

/**
 * The cases of a reference file in this folder, the texts "Infinity" and "-Infinity" read as numbers.
 *
 * @param file name without folder, for example "01_robbins_monro.json".
 */
export function readReference<Inputs = Record<string, unknown>, Outputs = Record<string, unknown>>(
  file: string,
): ReferenceCase<Inputs, Outputs>[] {
  const text = readFileSync(new URL(file, import.meta.url), 'utf8');
  const parsed = JSON.parse(text, revive) as { cases: ReferenceCase<Inputs, Outputs>[] };
  if (!Array.isArray(parsed.cases) || parsed.cases.length === 0) throw new Error(`${file} holds no cases.`);
  return parsed.cases;
}

/**
 * Compares numbers with reference values and remembers the largest deviation, in units of the tolerance and
 * absolute, so that a suite can print it when it is done.
 */
export class Deviations {
  private largest = { absolute: 0, share: 0, at: 'nowhere' };
  private count = 0;

  constructor(readonly method: string) {}

  /** Throws when a value lies outside the tolerance, or exactly one of both is missing (null, undefined). */
  compare(got: unknown, expected: unknown, tolerance: Tolerance, at: string): void {
    if (Array.isArray(expected)) {
      if (!Array.isArray(got) && !ArrayBuffer.isView(got))
        throw new Error(`${at}: expected a list, got ${String(got)}`);
      const list = Array.from(got as ArrayLike<unknown>);
      if (list.length !== expected.length) {
        throw new Error(`${at}: expected ${expected.length} values, got ${list.length}`);
      }
      expected.forEach((value, index) => this.compare(list[index], value, tolerance, `${at}[${index + 1}]`));
      return;
    }
    this.count += 1;
    if (typeof expected !== 'number' || typeof got !== 'number') {
      if ((got ?? null) !== (expected ?? null)) {
        throw new Error(`${at}: expected ${String(expected)}, got ${String(got)}`);
      }
      return;
    }
    if (got === expected) return;
    const absolute = Math.abs(got - expected);
    const allowed = tolerance.abs + tolerance.rel * Math.abs(expected);
    if (!(absolute <= allowed)) {
      throw new Error(`${at}: expected ${expected}, got ${got}, off by ${absolute}, allowed ${allowed}`);
    }
    if (absolute / allowed > this.largest.share) this.largest = { absolute, share: absolute / allowed, at };
  }

  /** One line for the log of a test run. */
  summary(): string {
    const { absolute, share, at } = this.largest;
    return `${this.method}: ${this.count} values, largest deviation ${absolute.toExponential(1)} (${(100 * share).toFixed(2)} % of the tolerance) at ${at}`;
  }
}
