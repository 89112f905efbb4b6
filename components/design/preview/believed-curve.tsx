'use client';

import { useId, useState } from 'react';
import { controlClass } from '@/components/forms/control-class';
import { FieldFrame, describedBy } from '@/components/forms/field-frame';
import { Button } from '@/components/ui/button';
import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';
import { impliedBelief, readBelief, type BeliefField, type TypedBelief } from './belief';
import { Believed } from './believed';

/**
 * What the design does if the response runs as someone believes: the curve through two believed points, and the advice.
 * At first the belief is the one the rule's own settings take for granted; what is typed stays when the design changes.
 */
export function BelievedCurve({ design }: { design: Design }) {
  const [typed, setTyped] = useState<TypedBelief | null>(null);
  const id = useId();
  const belief = typed ?? impliedBelief(design);
  const read = readBelief(design, belief);
  const change = (part: Partial<TypedBelief>) => setTyped({ ...belief, ...part });
  const field = (name: BeliefField, label: string) => (
    <BeliefInput
      id={`${id}-${name}`}
      label={label}
      value={belief[name]}
      error={!read.ok && read.field === name ? read.message : undefined}
      onChange={(value) => change({ [name]: value })}
    />
  );
  const unit = unitText(design.unit);
  return (
    <div className="grid gap-4">
      <p className="max-w-prose text-sm text-ink-soft">
        {typed === null
          ? 'The curve this rule’s settings take for granted, with the target at the middle of the doses. Type your own belief: it is a preview and is not stored.'
          : 'Your belief, for this preview only: it is not stored with the design.'}
      </p>
      <div role="group" aria-label="Believed curve" className="grid max-w-120 grid-cols-2 gap-x-4 gap-y-3">
        {field('dose1', `At a dose of, ${unit}`)}
        {field('probability1', 'probability')}
        {field('dose2', `and at, ${unit}`)}
        {field('probability2', 'probability')}
        <div className="col-span-2 flex flex-wrap items-end gap-x-4 gap-y-2">
          <label className="grid gap-1 font-semibold">
            Shape
            <select
              className={`${controlClass()} font-normal`}
              value={belief.link}
              onChange={(event) => change({ link: event.target.value === 'probit' ? 'probit' : 'logit' })}
            >
              <option value="logit">logit</option>
              <option value="probit">probit</option>
            </select>
          </label>
          {typed === null ? null : (
            <Button small variant="quiet" onClick={() => setTyped(null)}>
              Back to the rule’s own belief
            </Button>
          )}
        </div>
      </div>
      {read.ok ? <Believed design={design} curve={read.curve} /> : null}
    </div>
  );
}

function BeliefInput({
  id,
  label,
  value,
  error,
  onChange,
}: {
  id: string;
  label: string;
  value: string;
  error: string | undefined;
  onChange: (value: string) => void;
}) {
  return (
    <FieldFrame elementId={id} label={label} error={error}>
      <input
        id={id}
        type="text"
        inputMode="decimal"
        autoComplete="off"
        maxLength={40}
        value={value}
        onChange={(event) => onChange(event.target.value)}
        className={`${controlClass(error)} max-w-40 text-right`}
        {...describedBy(id, null, error)}
      />
    </FieldFrame>
  );
}
