import type { ButtonHTMLAttributes } from 'react';

type Props = ButtonHTMLAttributes<HTMLButtonElement> & { readonly variant?: 'primary' | 'plain' | 'danger' };

export const buttonLooks = {
  primary: 'border-primary bg-primary text-on-primary hover:opacity-90',
  plain: 'border-primary bg-surface text-primary hover:bg-sunk',
  danger: 'border-bad bg-surface text-bad hover:bg-sunk',
} as const;
export const buttonBase =
  'inline-flex min-h-9 items-center justify-center gap-2 border px-3.5 text-sm font-semibold whitespace-nowrap disabled:cursor-not-allowed disabled:border-line disabled:bg-sunk disabled:text-ink-2 disabled:opacity-100';

export function Button({ variant = 'primary', type = 'button', className = '', ...rest }: Props) {
  return <button type={type} className={`${buttonBase} ${buttonLooks[variant]} ${className}`} {...rest} />;
}
