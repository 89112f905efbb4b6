'use client';

import type { ReactNode } from 'react';
import { Button, type ButtonVariant } from '../ui/button';
import { useFormParts } from './form-context';

/**
 * The button that sends a form, worded as the act.
 * @param pendingLabel what it says meanwhile, such as "Recording…"
 * @param disabledReason why the act is not to be had now
 */
export function SubmitButton({
  children,
  variant = 'primary',
  pendingLabel,
  disabledReason,
  small,
}: {
  children: ReactNode;
  variant?: ButtonVariant;
  pendingLabel?: string;
  disabledReason?: ReactNode;
  small?: boolean;
}) {
  const { pending, ready } = useFormParts();
  return (
    <Button
      type="submit"
      variant={variant}
      small={small}
      pending={pending}
      pendingLabel={pendingLabel}
      disabled={!ready}
      disabledReason={disabledReason}
    >
      {children}
    </Button>
  );
}
