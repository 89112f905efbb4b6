import { numberSegments, type PrintContext, type Segment } from './format';
import type { TraceLine, TraceNumber, TraceResult } from './line';
import { LINE_LABELS, NUMBERED_LINES, REASON_SENTENCES, RESULT_WORDS, WORKING_LINES } from './words';

/** A line of a trace as printed, for page, letter and report alike. */
export interface PrintedLine {
  /** The number of its step of METHODS, on the main line of each step. */
  readonly step: string | null;
  readonly label: readonly Segment[];
  readonly formula: readonly Segment[];
  readonly result: readonly Segment[];
  /** What the step changed and why; null where it changed nothing. */
  readonly note: readonly Segment[] | null;
  readonly source: string | null;
  readonly acted: boolean;
}

const TOKEN = /\^\{(\w+)\}|_\{(\w+)\}|\^\[([^\]]*)\]|_\[([^\]]*)\]|\{(\w+)\}/g;

/**
 * Prints a template (see {@link TraceLine.formula}). `{unit}` prints the trial's unit. Throws an Error for a name without a
 * number: a template and its numbers are written together.
 */
export function templateSegments(
  template: string,
  numbers: Readonly<Record<string, TraceNumber>>,
  context: PrintContext,
): Segment[] {
  const segments: Segment[] = [];
  let at = 0;
  for (const match of template.matchAll(TOKEN)) {
    if (match.index > at) segments.push({ text: template.slice(at, match.index) });
    at = match.index + match[0].length;
    const [, raised, lowered, raisedText, loweredText, plain] = match;
    if (raisedText !== undefined) segments.push({ text: raisedText, shift: 'sup' });
    else if (loweredText !== undefined) segments.push({ text: loweredText, shift: 'sub' });
    else if (plain === 'unit') segments.push({ text: context.unit });
    else {
      const name = raised ?? lowered ?? plain ?? '';
      const number = numbers[name];
      if (number === undefined) throw new Error(`The formula "${template}" has no number named ${name}.`);
      const printed = numberSegments(number, context);
      const shift = raised !== undefined ? 'sup' : lowered !== undefined ? 'sub' : undefined;
      if (shift !== undefined) {
        segments.push({ text: printed.map((piece) => piece.text).join(''), shift });
      } else if (isNegative(printed) && /[−+×/(] ?$/.test(template.slice(0, match.index))) {
        segments.push({ text: '(' }, ...printed, { text: ')' });
      } else segments.push(...printed);
    }
  }
  if (at < template.length) segments.push({ text: template.slice(at) });
  return merged(segments);
}

function isNegative(segments: readonly Segment[]): boolean {
  return segments[0]?.text.startsWith('−') ?? false;
}

function merged(segments: readonly Segment[]): Segment[] {
  const result: Segment[] = [];
  for (const segment of segments) {
    const last = result[result.length - 1];
    if (last !== undefined && last.shift === segment.shift) {
      result[result.length - 1] = { ...last, text: last.text + segment.text };
    } else result.push(segment);
  }
  return result;
}

function isDose(number: TraceNumber): boolean {
  return number.form === 'dose' || number.form === 'dose-computed';
}

function withUnit(number: TraceNumber, context: PrintContext): Segment[] {
  const digits = numberSegments(number, context);
  return isDose(number) ? [...digits, { text: `\u00a0${context.unit}` }] : digits;
}

function resultSegments(result: TraceResult, context: PrintContext): Segment[] {
  return 'word' in result ? [{ text: RESULT_WORDS[result.word] }] : merged(withUnit(result, context));
}

function symbolSegments(line: TraceLine): Segment[] {
  if (line.symbol === undefined) return [];
  const { name, index } = line.symbol;
  return [
    { text: name },
    ...(index === undefined ? [] : [{ text: String(index), shift: 'sub' as const }]),
    { text: ' = ' },
  ];
}

/** The working scale's unit: "ln mg" or "mg". */
export function workingUnit(context: PrintContext): string {
  return context.scale === 'log' ? `ln ${context.unit}` : context.unit;
}

function noteSegments(line: TraceLine, context: PrintContext): Segment[] | null {
  const { reason, before, after } = line;
  if (reason === undefined || reason.code === 'rounded') return null;
  const sentence = { text: REASON_SENTENCES[reason.code] };
  const both = line.acted && before !== undefined && after !== undefined && line.step >= 2;
  if (!both) return [sentence];
  return merged([
    { text: 'Changed from ' },
    ...withUnit(before, context),
    { text: ' to ' },
    ...withUnit(after, context),
    { text: '. ' },
    sentence,
  ]);
}

/** Turns a line of a trace into printed pieces; pure, so that page, letter and report print the same. */
export function printLine(line: TraceLine, context: PrintContext): PrintedLine {
  const label = LINE_LABELS[line.id];
  const numbered = NUMBERED_LINES.includes(line.id) && !(line.id === 'largest-rise' && line.step !== 2);
  return {
    step: numbered ? String(line.step) : null,
    label: [{ text: WORKING_LINES.includes(line.id) ? `${label}, ${workingUnit(context)}` : label }],
    formula:
      line.formula === ''
        ? []
        : merged([...symbolSegments(line), ...templateSegments(line.formula, line.numbers, context)]),
    result: resultSegments(line.result, context),
    note: noteSegments(line, context),
    source: line.source ?? null,
    acted: line.acted,
  };
}
