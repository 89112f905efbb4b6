import { z } from 'zod';

/** Longest unit code read. */
export const UNIT_TEXT_LENGTH = 40;

/** A unit code with the text people read and its name in words. */
export interface Unit {
  code: string;
  text: string;
  name: string;
}

/** The units offered first (codes of the Unified Code for Units of Measure, case-sensitive). */
export const CURATED_UNITS: readonly Unit[] = [
  { code: 'mg', text: 'mg', name: 'milligram' },
  { code: 'ug', text: 'µg', name: 'microgram' },
  { code: 'ng', text: 'ng', name: 'nanogram' },
  { code: 'g', text: 'g', name: 'gram' },
  { code: 'mg/kg', text: 'mg/kg', name: 'milligram per kilogram' },
  { code: 'ug/kg', text: 'µg/kg', name: 'microgram per kilogram' },
  { code: 'mg/m2', text: 'mg/m²', name: 'milligram per square metre' },
  { code: 'mL', text: 'mL', name: 'millilitre' },
  { code: 'uL', text: 'µL', name: 'microlitre' },
  { code: 'mL/kg', text: 'mL/kg', name: 'millilitre per kilogram' },
  { code: 'mg/mL', text: 'mg/mL', name: 'milligram per millilitre' },
  { code: 'ug/mL', text: 'µg/mL', name: 'microgram per millilitre' },
  { code: '%', text: '%', name: 'per cent' },
  { code: 'mg/h', text: 'mg/h', name: 'milligram per hour' },
  { code: 'ug/min', text: 'µg/min', name: 'microgram per minute' },
  { code: 'ug/kg/min', text: 'µg/kg/min', name: 'microgram per kilogram and minute' },
  { code: 'mmol', text: 'mmol', name: 'millimole' },
  { code: 'umol', text: 'µmol', name: 'micromole' },
  { code: '[iU]', text: 'IU', name: 'international unit' },
  { code: '[iU]/kg', text: 'IU/kg', name: 'international unit per kilogram' },
  { code: 'm[iU]', text: 'mIU', name: 'milli-international unit' },
  { code: '[CFU]', text: 'CFU', name: 'colony-forming unit' },
  { code: '[PFU]', text: 'PFU', name: 'plaque-forming unit' },
  { code: '[FFU]', text: 'FFU', name: 'focus-forming unit' },
  { code: '[TCID_50]', text: 'TCID50', name: 'median tissue culture infective dose' },
  { code: '{cells}', text: 'cells', name: 'cells' },
  { code: '10*6.{cells}', text: '10⁶ cells', name: 'million cells' },
  { code: '{genomes}', text: 'genome copies', name: 'genome copies' },
  { code: 'Gy', text: 'Gy', name: 'gray' },
  { code: 'MBq', text: 'MBq', name: 'megabecquerel' },
  { code: 'GBq', text: 'GBq', name: 'gigabecquerel' },
  { code: '{tbl}', text: 'tablets', name: 'tablets' },
  { code: 'mA', text: 'mA', name: 'milliampere' },
  { code: 'mmol/L', text: 'mmol/L', name: 'millimole per litre' },
];

/** Spellings in use that are no codes, and the code to write instead. */
const MISTAKEN: Readonly<Record<string, string>> = {
  mcg: 'ug',
  'mcg/kg': 'ug/kg',
  'mcg/kg/min': 'ug/kg/min',
  'mcg/mL': 'ug/mL',
  'mcg/min': 'ug/min',
  'mcg/h': 'ug/h',
  µg: 'ug',
  μg: 'ug',
  'µg/kg': 'ug/kg',
  'μg/kg': 'ug/kg',
  'µg/kg/min': 'ug/kg/min',
  'μg/kg/min': 'ug/kg/min',
  µL: 'uL',
  μL: 'uL',
  IU: '[iU]',
  iu: '[iU]',
  'I.U.': '[iU]',
  'IU/kg': '[iU]/kg',
  mIU: 'm[iU]',
  U: '[iU]',
  units: '[iU]',
  cc: 'mL',
  ccm: 'mL',
  MG: 'mg',
  Mg: 'mg',
  mgs: 'mg',
  'Mg/kg': 'mg/kg',
  gm: 'g',
  gr: 'g',
  G: 'g',
  KG: 'kg',
  Kg: 'kg',
  ML: 'mL',
  'mg/m²': 'mg/m2',
  'mg/m^2': 'mg/m2',
  'mg/sqm': 'mg/m2',
  CFU: '[CFU]',
  cfu: '[CFU]',
  PFU: '[PFU]',
  pfu: '[PFU]',
  FFU: '[FFU]',
  TCID50: '[TCID_50]',
  cells: '{cells}',
  tablet: '{tbl}',
  tablets: '{tbl}',
  percent: '%',
  mEq: 'meq',
  hr: 'h',
  'mg/hr': 'mg/h',
  sec: 's',
};

/** Atoms a dose unit may be built of. The first group takes a metric prefix, the second does not. */
const METRIC = String.raw`(?:g|L|l|mol|m|s|eq|Bq|Gy|Sv|J|A|V|W|Hz|Pa|\[iU\]|\[IU\])`;
const PLAIN = String.raw`(?:%|\[ppm\]|\[ppb\]|\[CFU\]|\[PFU\]|\[FFU\]|\[TCID_50\]|\[CCID_50\]|\[EID_50\]|\[Lf\]|min|h|d|wk|mo|a)`;
const ANNOTATION = String.raw`\{[!-z|~]{1,20}\}`;
const SIMPLE = String.raw`(?:(?:[fpnumcdkMG]?${METRIC}|${PLAIN})(?:-?[1-9])?(?:${ANNOTATION})?|10[*^]-?[1-9]\d?(?:${ANNOTATION})?|[1-9]\d{0,3}|${ANNOTATION})`;
const UNIT = new RegExp(`^${SIMPLE}(?:[./]${SIMPLE})*$`);

/** Prefixes that are legal but are more often a slip of the shift key than meant in a dose. */
const SUSPICIOUS = /(?:^|[./])(?:M|G)(?:g|L|l|m|s|mol)(?:[./\-1-9]|$)/;

/** Why a text is no unit code Stepwell takes, as a sentence; null when it is one. */
export function unitProblem(code: string): string | null {
  if (code.length === 0) return 'The unit is missing. Choose one, or enter its UCUM code, for example mg.';
  if (code.length > UNIT_TEXT_LENGTH) {
    return `The unit is longer than ${UNIT_TEXT_LENGTH} characters. Enter its UCUM code, for example mg/kg.`;
  }
  const right = Object.hasOwn(MISTAKEN, code) ? MISTAKEN[code] : undefined;
  if (right !== undefined) {
    return `"${code}" is not the UCUM code of this unit, which is case-sensitive. Enter ${right}.`;
  }
  if (!UNIT.test(code)) {
    return 'This is not a UCUM unit code of a dose. Enter one such as mg, ug/kg, mL, [iU] or 10*6.{cells}; letters count as they are written.';
  }
  if (SUSPICIOUS.test(code)) {
    return 'A capital M or G is mega or giga here. Enter the small letter (mg, mL), or a unit without that prefix.';
  }
  return null;
}

/** A dose's unit: a UCUM code, case-sensitive, of a curated list or built of known parts. */
export const unitSchema = z
  .string({ error: 'The unit is missing. Choose one, or enter its UCUM code, for example mg.' })
  .superRefine((code, context) => {
    const problem = unitProblem(code);
    if (problem !== null) context.addIssue({ code: 'custom', message: problem });
  });

/** The text people read for a unit code: "µg/kg" for "ug/kg"; the code itself where none is listed. */
export function unitText(code: string): string {
  return CURATED_UNITS.find((unit) => unit.code === code)?.text ?? code;
}
