import type { ComponentProps } from 'react';
import { buttonClass, type ButtonVariant } from './button';
import { PageLink } from './page-link';

/** A link that looks like a button: the act begins on another page. */
export function ButtonLink({
  variant = 'secondary',
  small = false,
  className = '',
  ...rest
}: ComponentProps<typeof PageLink> & { variant?: ButtonVariant; small?: boolean }) {
  return <PageLink {...rest} className={`${buttonClass(variant, small)} ${className}`} />;
}
