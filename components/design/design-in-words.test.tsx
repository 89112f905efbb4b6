import { render, screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { comparableDesign } from '@/lib/design/comparable-rule';
import { RULE_NAMES, ruleOf } from '@/lib/design/rules/registry';
import { designSchema, type Design } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { DesignInWords } from './design-in-words';

const levels = designDefaults('levels');
const detailOf = (term: string) => screen.getByText(term, { selector: 'dt' }).nextElementSibling;

describe('a design in words', () => {
  it('says the response, the target, doses and every guardrail', () => {
    render(<DesignInWords design={levels} />);
    expect(detailOf('Response')).toHaveTextContent('“dose-limiting toxicity”; without it “none”');
    expect(detailOf('What it is')).toHaveTextContent('a harm; its probability rises with dose');
    expect(detailOf('Target Γ')).toHaveTextContent('the probability of a response is 0.25');
    expect(detailOf('2 Largest rise')).toHaveTextContent('to at most 2 times the current dose');
    expect(detailOf('6 Coherence')).toHaveTextContent('no rise after a cohort at or above the target');
    expect(detailOf('7 Closed doses')).toHaveTextContent(
      'above 0.95, from 3 evaluable subjects on; prior Beta(1, 1)',
    );
    expect(detailOf('Subjects')).toHaveTextContent('when another cohort would exceed 30 evaluable subjects');
    expect(screen.getByRole('row', { name: '2 20 2.996 × 2' })).toBeInTheDocument();
    expect(screen.getByRole('row', { name: '4 60 4.094 × 1.5' })).toBeInTheDocument();
  });

  it('names every rule with its source, when it suits, and its settings', () => {
    for (const name of RULE_NAMES) {
      const { unmount } = render(<DesignInWords design={comparableDesign(name, levels)} />);
      const { title, source, suits } = ruleOf(name).about;
      expect(screen.getByRole('heading', { name: `Rule: ${title}` })).toBeInTheDocument();
      expect(screen.getByText(suits)).toBeInTheDocument();
      expect(detailOf('Source')).toHaveTextContent(source);
      unmount();
    }
  });

  it('prints levels in powers of ten, a falling wanted response, and every stopping rule', () => {
    const design: Design = designSchema.parse({
      ...levels,
      doses: { kind: 'levels', levels: ['1000', '10000', '200000'] },
      startingDose: '1000',
      unit: '[CFU]',
      doseNotation: 'powers-of-ten',
      response: { present: 'not infected', absent: 'infected', kind: 'wanted', direction: 'falling' },
      guardrails: { ...levels.guardrails, closing: null, largestRise: null, coherence: 'both' },
      stopping: {
        maximumSubjects: null,
        repeated: { times: 3, subjects: 6 },
        precision: { estimator: 'logit-fieller', level: 0.8, width: 1.5, minimumSubjects: 12 },
      },
    });
    render(<DesignInWords design={design} />);
    expect(screen.getByRole('cell', { name: '2 × 10⁵' })).toBeInTheDocument();
    expect(detailOf('Starting dose')).toHaveTextContent('10³ CFU');
    expect(detailOf('6 Coherence')).toHaveTextContent(
      'no fall after a cohort at or above the target, no rise after one below it',
    );
    expect(detailOf('Same dose repeated')).toHaveTextContent('3 times in a row');
    expect(detailOf('Precision reached')).toHaveTextContent('80 % interval (logit fit, Fieller)');
    expect(screen.queryByText('No dose left')).toBeNull();
  });

  it('takes labels that look like a formula as they are', () => {
    render(
      <DesignInWords
        design={{ ...levels, response: { ...levels.response, present: 'loss {of} _[block]' } }}
      />,
    );
    expect(detailOf('Response')).toHaveTextContent('“loss {of} _[block]”');
  });
});
