import { compareDecimals, equalDecimals } from '@/lib/design/decimal';
import { doseText } from '@/lib/design/dose-text';
import type { Design } from '@/lib/schemas/design';

/** What the words of a packet are made of. */
export interface PacketFacts {
  readonly number: number;
  readonly outcome: 'dose' | 'stop';
  readonly dose: string | null;
  readonly currentDose: string | null;
  readonly design: Design;
}

/** The question a packet asks, as its title. */
export function packetQuestion({ number, outcome, dose, currentDose, design }: PacketFacts): string {
  if (outcome === 'stop' || dose === null) return `Stop after cohort ${number - 1}?`;
  const text = doseText(design, dose);
  if (currentDose === null) return `Start at ${text}?`;
  const move = compareDecimals(dose, currentDose);
  if (move === 0) return `Repeat ${text} for cohort ${number}?`;
  return move > 0 ? `Rise to ${text} for cohort ${number}?` : `Go down to ${text} for cohort ${number}?`;
}

const WORDS = ['None', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine', 'Ten'];
const inWords = (count: number): string => WORDS[count] ?? String(count);

/** What happened in the cohort under review, in one sentence. */
export function packetLede(
  facts: PacketFacts,
  observed: { readonly responses: number; readonly evaluable: number },
): string {
  const { design, currentDose, number } = facts;
  if (currentDose === null) {
    return 'The design is approved. Its starting dose is signed like every other step.';
  }
  const { responses, evaluable } = observed;
  const proportion = evaluable === 0 ? 0 : responses / evaluable;
  const against = proportion > design.target ? 'above' : proportion < design.target ? 'below' : 'exactly at';
  return `${inWords(responses)} of ${evaluable} subjects in cohort ${number - 1} had “${design.response.present}” at ${doseText(design, currentDose)}, ${against} the target of ${design.target}.`;
}

/** True when a dose is the current one. */
export function isCurrent(dose: string, currentDose: string | null): boolean {
  return currentDose !== null && equalDecimals(dose, currentDose);
}
