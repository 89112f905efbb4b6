import { doseText } from '@/lib/design/dose-text';
import type { Design } from '@/lib/schemas/design';
import type { SignChoice } from '@/lib/schemas/sign-decision-input';
import type { OfferedDecision } from './decision-form';
import { isCurrent } from './packet-words';

/** What the form needs to know of a decision that may be signed. */
export interface SignableChoice {
  readonly decision: 'release' | 'return' | 'stop';
  readonly dose: string | null;
  readonly isLower: boolean;
  readonly meaning: string;
  /** Signatures of others that stand on it. */
  readonly standing: number;
}

interface OfferedPacket {
  readonly number: number;
  readonly currentDose: string | null;
  readonly design: Design;
  readonly choices: readonly SignableChoice[];
}

const stepWords = (count: number, quorum: number, last: string, before: string): string =>
  count >= quorum ? last : `${before} (${count} of ${quorum})`;

/** The decisions of a packet in words: what each brings about, and what the button says before it is signed. */
export function offeredDecisions(
  packet: OfferedPacket,
  quorum: number,
): { decisions: OfferedDecision[]; lowerDoses: { value: string; label: string }[] } {
  const { number, design, currentDose } = packet;
  const button = ({ decision, dose, standing }: SignableChoice): string => {
    if (decision === 'return') return 'Sign and return the packet';
    if (decision === 'stop') {
      return stepWords(standing + 1, quorum, 'Sign and stop the trial', 'Sign for the stop');
    }
    const text = doseText(design, dose ?? '');
    return stepWords(standing + 1, quorum, `Sign and release ${text}`, `Sign for ${text}`);
  };
  const entry = (choice: SignableChoice) => ({ meaning: choice.meaning, button: button(choice) });
  const decision = (
    choice: SignChoice,
    label: string,
    consequence: string,
    choices: readonly SignableChoice[],
  ): OfferedDecision[] =>
    choices.length === 0
      ? []
      : [
          {
            choice,
            label,
            consequence,
            byDose: Object.fromEntries(
              choices.map((each) => [choice === 'lower' ? (each.dose ?? '') : '', entry(each)]),
            ),
          },
        ];

  const releases = packet.choices.filter((each) => each.decision === 'release');
  const recommended = releases.filter((each) => !each.isLower);
  const lower = releases.filter((each) => each.isLower);
  const isLast = (recommended[0]?.standing ?? 0) + 1 >= quorum;
  const recommendedText = doseText(design, recommended[0]?.dose ?? '');
  const doses = lower.map((each) => each.dose ?? '');
  const returns =
    number === 1
      ? 'The design goes back to its statistician.'
      : 'Records open for answers and corrections; no new subjects.';
  return {
    decisions: [
      ...decision(
        'recommended',
        `Release ${recommendedText} for cohort ${number}`,
        isLast
          ? 'Yours is the last signature: sites are told at once, places open.'
          : `Counts as one of ${quorum} signatures; nothing is released before the last.`,
        recommended,
      ),
      ...decision(
        'lower',
        'Release a lower dose',
        `${lowerInWords(doses, design)}, with a reason. A higher dose cannot be released.`,
        lower,
      ),
      ...decision(
        'return',
        number === 1 ? 'Return to the statistician' : 'Return to the sites with questions',
        returns,
        packet.choices.filter((each) => each.decision === 'return'),
      ),
      ...decision(
        'stop',
        'Stop dosing for good',
        'Closes the trial to enrolment when the quorum has signed it.',
        packet.choices.filter((each) => each.decision === 'stop'),
      ),
    ],
    lowerDoses: lower.map((each) => ({
      value: each.dose ?? '',
      label: `${doseText(design, each.dose ?? '')}${isCurrent(each.dose ?? '', currentDose) ? ' (repeat the current dose)' : ''}`,
    })),
  };
}

function lowerInWords(doses: readonly string[], design: Design): string {
  if (doses.length > 5) {
    return `${doseText(design, doses.at(-1) ?? '')} to ${doseText(design, doses[0] ?? '')}`;
  }
  const texts = doses.map((dose) => doseText(design, dose));
  return texts.length > 1 ? `${texts.slice(0, -1).join(', ')} or ${texts.at(-1)}` : (texts[0] ?? '');
}
