import { adviceTexts, adviseDesign, type BelievedCurve, type DesignAdvice } from '@/lib/design/advice';
import { doseText } from '@/lib/design/dose-text';
import type { Design } from '@/lib/schemas/design';
import type { WordsItem } from '../rule-words';
import { workingUnit } from '../working-unit';
import { computedText, probabilityText } from './computed-text';

/** What a design's advice says: the figures, and what to think about. */
export interface AdviceInWords {
  readonly items: readonly WordsItem[];
  readonly cautions: readonly string[];
}

function errorItems(advice: DesignAdvice, design: Design): WordsItem[] {
  const { asymptoticError, bestError, linearError } = advice.gains.believed;
  const unit = workingUnit(design);
  const inLargeSamples =
    asymptoticError === null
      ? 'none in large samples, where 2cD is not above 1'
      : `${computedText(asymptoticError)} ${unit} in large samples`;
  return [
    {
      term: `Standard error after ${design.maximumCohorts} cohorts`,
      detail: `${inLargeSamples}; the least of any gain is ${computedText(bestError)}`,
    },
    {
      term: 'Error from this start',
      detail: `${computedText(linearError)} ${unit} on average, were the curve straight at the target`,
    },
  ];
}

function settlingText(advice: DesignAdvice, design: Design): string {
  const levels = advice.settling ?? [];
  if (levels.length === 0) return 'on no level';
  return levels
    .map(({ dose, probability }) => `${doseText(design, dose)} (${probabilityText(probability)})`)
    .join(', ');
}

function freezeText({ freeze }: DesignAdvice): string {
  const from = (step: number | null) =>
    step === null ? 'not within the cohorts planned' : `from step ${step} on`;
  return `no rise any more ${from(freeze?.noRiseFrom ?? null)}; no fall any more ${from(freeze?.noFallFrom ?? null)}`;
}

/** The advice on a design under a believed curve, in words. */
export function adviceInWords(design: Design, curve: BelievedCurve): AdviceInWords {
  const advice = adviseDesign(design, { curve });
  const { believed } = advice.gains;
  const { slopes, bestGain } = advice;
  const unit = workingUnit(design);
  return {
    items: [
      {
        term: 'Slope D at the target',
        detail: `${computedText(slopes.believed.curve)} per ${unit} (as a logit slope ${computedText(slopes.believed.logit)}, as a probit slope ${computedText(slopes.believed.probit)})`,
      },
      { term: 'Best gain 1/D', detail: `${computedText(bestGain)} ${unit}` },
      {
        term: 'This rule’s gain',
        detail: `${computedText(bestGain * believed.share)} ${unit} in the long run; 2cD = ${computedText(believed.twoCD)}${
          believed.efficiency === null || believed.tooSmall
            ? ''
            : `, ${Math.round(believed.efficiency * 100)} % efficient`
        }`,
      },
      ...errorItems(advice, design),
      ...(advice.settling ? [{ term: 'Can settle on', detail: settlingText(advice, design) }] : []),
      ...(advice.freeze ? [{ term: 'Freezes', detail: freezeText(advice) }] : []),
    ],
    cautions: advice.notes.map((note) => adviceTexts[note]),
  };
}
