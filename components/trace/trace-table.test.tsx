import { render, screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { recommend } from '@/lib/design/recommend';
import { printContext } from '@/lib/design/trace/format';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { TraceTable } from './trace-table';

const design = {
  ...designDefaults('levels'),
  rule: { name: 'robbins-monro', c: 4.5, k0: 0, gamma: 1, carry: 'iterate', carryReason: null } as const,
};

function show() {
  const subjects = [0, 1, 2].map((i) => ({ given: '10', response: i === 9 }));
  const result = recommend(design, {
    cohorts: [{ number: 1, released: '10', loweredRelease: false, subjects }],
  });
  if (!result.ok) throw new Error(result.error.message);
  render(
    <TraceTable lines={result.value.lines} context={printContext(design)} caption="How 20 mg was reached" />,
  );
}

describe('TraceTable', () => {
  it('is a table with a name, column headers and a row header for every step', () => {
    show();
    const table = screen.getByRole('table', { name: 'How 20 mg was reached' });
    expect(within(table).getAllByRole('columnheader')).toHaveLength(3);
    for (const step of ['1', '2', '3', '4', '5', '6', '7', '8']) {
      expect(within(table).getByRole('rowheader', { name: new RegExp(`^Step ?${step} `) })).toBeVisible();
    }
  });

  it('prints symbols with lowered indices and says what a guardrail changed and why', () => {
    show();
    const gain = screen.getByRole('row', { name: /Step size/ });
    expect(gain.querySelector('sub')).toHaveTextContent('1');
    const rise = screen.getByRole('row', { name: /Largest rise/ });
    expect(rise).toHaveTextContent('at most 2 × 10.0 = 20.0 mg');
    expect(rise).toHaveTextContent('The rule asked for more than the largest rise allows.');
    expect(rise).toHaveTextContent('changed');
  });

  it('names the published source of the rule', () => {
    show();
    expect(screen.getByText(/Robbins & Monro \(1951\)/)).toBeVisible();
  });
});
