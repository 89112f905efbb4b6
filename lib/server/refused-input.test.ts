import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { refusedInput } from './refused-input';

const schema = z.strictObject({
  reason: z.string({ error: 'Give the reason.' }).min(5, { error: 'Too short.' }),
  doses: z.object({ levels: z.array(z.number({ error: 'Not a number.' })) }),
});
const refusalOf = (input: unknown) => {
  const result = schema.safeParse(input);
  if (result.success) throw new Error('This was to be refused.');
  return refusedInput(result.error);
};

describe('a refused input', () => {
  it('names each field by its path, with its first sentence', () => {
    expect(refusalOf({ reason: 'no', doses: { levels: [1, 'x', NaN] } })).toEqual({
      code: 'invalid',
      message: 'Nothing was recorded. 3 entries need a change.',
      fields: { reason: 'Too short.', 'doses.levels.1': 'Not a number.', 'doses.levels.2': 'Not a number.' },
    });
  });

  it('says in its message what concerns no field', () => {
    const refusal = refusalOf({ reason: 'long enough', doses: { levels: [] }, role: 'reviewer' });
    expect(refusal.message).toMatch(/^Nothing was recorded\. .*role/);
    expect(refusal.fields).toEqual({});
  });

  it('counts one in the singular', () => {
    expect(refusalOf({ reason: 'no', doses: { levels: [] } }).message).toBe(
      'Nothing was recorded. One entry needs a change.',
    );
  });

  it('names at most fifty fields of a hostile input', () => {
    const levels = Array.from({ length: 10_000 }, () => 'x');
    expect(Object.keys(refusalOf({ reason: 'enough', doses: { levels } }).fields ?? {})).toHaveLength(50);
  });
});
