import type { AnchorHTMLAttributes, ButtonHTMLAttributes, ReactNode } from 'react';
import { Icon, type IconName } from './Icon';

interface Look {
  /** `filled`: the one thing to do in view. `framed`: alternatives. `bare`: tools. `harmful`: cancels or removes. */
  look?: 'filled' | 'framed' | 'bare' | 'harmful' | undefined;
  large?: boolean | undefined;
  icon?: IconName | undefined;
  children: ReactNode;
}

function classOf(
  look: Look['look'],
  large: boolean | undefined,
  extra: string | undefined,
): string {
  return ['button', `button--${look ?? 'framed'}`, large ? 'button--large' : '', extra ?? '']
    .filter(Boolean)
    .join(' ');
}

export function Button({
  look,
  large,
  icon,
  children,
  className,
  type = 'button',
  ...rest
}: Look & ButtonHTMLAttributes<HTMLButtonElement>) {
  return (
    <button type={type} className={classOf(look, large, className)} {...rest}>
      {icon ? <Icon name={icon} /> : null}
      {children}
    </button>
  );
}

export function ButtonLink({
  look,
  large,
  icon,
  children,
  className,
  ...rest
}: Look & AnchorHTMLAttributes<HTMLAnchorElement>) {
  return (
    <a className={classOf(look, large, className)} {...rest}>
      {icon ? <Icon name={icon} /> : null}
      {children}
    </a>
  );
}
