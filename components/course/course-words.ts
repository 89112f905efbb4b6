import { doseNumber } from '@/lib/design/dose-text';
import type { CourseCohort, CourseData } from './course-data';

/** A dose as the trial prints it, without its unit. */
export function printed({ notation = 'plain' }: CourseData, dose: string | number): string {
  return doseNumber(notation, String(dose));
}

/** A dose to three significant digits, for an estimate; whole numbers stay whole. */
export function roundedDose(dose: string | number): string {
  return String(Number(Number(dose).toPrecision(3)));
}

/** The estimate in words: "estimate 47 mg, 80 % interval 22 to 97". */
export function estimateInWords({ estimate, unit }: CourseData): string {
  if (!estimate) return '';
  const { dose, low, high, coverage } = estimate;
  const value = `estimate ${roundedDose(dose)} ${unit}`;
  if (low === undefined || high === undefined) return value;
  const share = coverage === undefined ? '' : `${Number((coverage * 100).toFixed(1))} % `;
  return `${value}, ${share}interval ${roundedDose(low)} to ${roundedDose(high)}`;
}

/** What happened in a cohort, in the trial's words: "1 of 3 dose-limiting toxicity"; empty where marks may not be seen. */
export function outcomesInWords({ marks }: CourseCohort, labels: CourseData['labels']): string {
  if (!marks) return '';
  const count = (outcome: string) => marks.filter((mark) => mark === outcome).length;
  const evaluable = count('present') + count('absent');
  const parts = [`${count('present')} of ${evaluable} ${labels?.present ?? 'present'}`];
  if (count('not-evaluable') > 0) parts.push(`${count('not-evaluable')} not evaluable`);
  if (count('pending') > 0) parts.push(`${count('pending')} awaited`);
  return parts.join(', ');
}

/** The whole course as text, for whoever does not see the drawing. */
export function courseInWords(data: CourseData): string {
  const steps = data.cohorts.map((cohort) => {
    const outcomes = outcomesInWords(cohort, data.labels);
    const state = cohort.state === 'signed' ? '' : `, ${cohort.state.replaceAll('-', ' ')}`;
    return `cohort ${cohort.number} at ${printed(data, cohort.dose)} ${data.unit}${state}${outcomes ? ` (${outcomes})` : ''}`;
  });
  if (data.proposed) {
    steps.push(
      `${printed(data, data.proposed.dose)} ${data.unit} proposed for cohort ${data.proposed.number}`,
    );
  }
  const begun = steps.length === 0 ? 'no dose released yet' : steps.join('; ');
  const estimate = estimateInWords(data);
  return `Course of doses: ${begun}${estimate ? `; ${estimate}` : ''}.`;
}
