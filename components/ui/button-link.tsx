import Link from 'next/link';
import type { ComponentProps } from 'react';
import { buttonClass, type ButtonVariant } from './button';

/** A link that looks like a button: the act begins on another page. */
export function ButtonLink({
  variant = 'secondary',
  small = false,
  className = '',
  ...rest
}: ComponentProps<typeof Link> & { variant?: ButtonVariant; small?: boolean }) {
  return <Link prefetch={false} {...rest} className={`${buttonClass(variant, small)} ${className}`} />;
}
