import { render, screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { designDefaults } from '@/lib/schemas/design-defaults';
import { comparableDesign } from '@/lib/design/comparable-rule';
import { Comparison, type ComparedRules } from './comparison';

const design = designDefaults('levels');
const dose = (value: string | null, isStop = false) => ({ dose: value, isStop });
const rule = (
  name: 'virtual-observations' | 'robbins-monro',
  doses: ComparedRules['rules'][number]['doses'],
) => ({
  name,
  title: name === 'robbins-monro' ? 'Robbins–Monro' : 'Virtual observations',
  design: comparableDesign(name, design),
  isOwn: name === 'virtual-observations',
  doses,
  failure: doses === null ? 'A computed value left the range of numbers.' : null,
});

const comparison = (rules: ComparedRules['rules']): ComparedRules => ({
  design,
  versionNumber: 1,
  offered: [
    { name: 'robbins-monro', title: 'Robbins–Monro', isChosen: true },
    { name: 'joseph', title: 'Joseph’s efficient gains', isChosen: false },
    { name: 'virtual-observations', title: 'Virtual observations', isChosen: true },
  ],
  rules,
  released: ['10', '20', '20', null],
});
const show = (rules: ComparedRules['rules']) =>
  render(<Comparison comparison={comparison(rules)} address="/trials/WELL-99/design" />);

describe('the comparison of rules', () => {
  it('is a table of doses by cohort, a chart with its words, and says where the rules differ', () => {
    show([
      rule('robbins-monro', [dose('10'), dose('20'), dose('20'), dose('20')]),
      rule('virtual-observations', [dose('10'), dose('20'), dose('20'), dose('40', true)]),
    ]);
    const table = screen.getByRole('table', { name: 'What each rule would have recommended' });
    const cells = (row: RegExp) =>
      within(within(table).getByRole('row', { name: row }))
        .getAllByRole('cell')
        .map((cell) => cell.textContent);
    expect(cells(/^3 /)).toEqual(['20', '20', '20']);
    expect(cells(/^4 /)).toEqual(['–', '20', '40 · stop']);
    const sentence = 'Both rules recommend the same dose for 3 of 4 cohorts; they differ for cohort 4.';
    expect(screen.getByText(sentence)).toBeInTheDocument();
    expect(screen.getByRole('img')).toHaveAccessibleName(new RegExp(sentence));
    expect(screen.getByRole('checkbox', { name: 'Robbins–Monro' })).toBeChecked();
    expect(screen.getByRole('checkbox', { name: 'Joseph’s efficient gains' })).not.toBeChecked();
  });

  it('prints a stop where every dose is closed, and says that rules agree', () => {
    const doses = [dose('10'), dose('20'), dose('20'), dose(null, true)];
    show([rule('robbins-monro', doses), rule('virtual-observations', doses)]);
    expect(screen.getByText('Both rules recommend the same dose for every cohort.')).toBeInTheDocument();
    expect(screen.getAllByRole('cell', { name: 'stop' })).toHaveLength(2);
  });

  it('shows why a rule gave no value, and the others all the same', () => {
    show([
      rule('robbins-monro', null),
      rule('virtual-observations', [dose('10'), dose('20'), dose('20'), dose('40')]),
    ]);
    expect(screen.getByText('Robbins–Monro gave no value')).toBeInTheDocument();
    expect(screen.getByText('A computed value left the range of numbers.')).toBeInTheDocument();
    expect(screen.getByText('Fewer than two rules gave a course to compare.')).toBeInTheDocument();
  });
});
