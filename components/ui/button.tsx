import type { ButtonHTMLAttributes } from 'react';

type Weight = 'primary' | 'plain' | 'danger' | 'quiet';

const WEIGHTS: Record<Weight, string> = {
  primary: 'bg-petrol border-petrol text-on-petrol hover:brightness-110',
  plain: 'bg-sheet border-ink text-ink hover:bg-petrol-wash',
  danger: 'bg-sheet border-brick text-brick hover:bg-brick-wash',
  quiet: 'bg-transparent border-transparent text-petrol underline underline-offset-4 hover:bg-petrol-wash',
};

/** The look of a button for links that lead to another page. */
export function buttonClass(weight: Weight = 'plain', size: 'desk' | 'glove' = 'desk'): string {
  const measure = size === 'glove' ? 'min-h-16 w-full px-5 text-lg' : 'min-h-10 px-4 py-1.5';
  return `inline-flex items-center justify-center gap-2 rounded border-[1.5px] font-semibold cursor-pointer no-underline disabled:cursor-not-allowed disabled:opacity-55 ${measure} ${WEIGHTS[weight]}`;
}

export interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  weight?: Weight;
  /** `glove` is for the shop floor: 64 px high and full width. */
  size?: 'desk' | 'glove';
}

export function Button({
  weight = 'plain',
  size = 'desk',
  className = '',
  type = 'button',
  ...rest
}: ButtonProps) {
  return <button type={type} className={`${buttonClass(weight, size)} ${className}`} {...rest} />;
}
