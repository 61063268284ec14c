import type { ReactNode } from 'react';
import { Button as AriaButton, type ButtonProps as AriaButtonProps } from 'react-aria-components';
import { Link, type LinkProps } from 'react-router-dom';

/** One `filled` a page, at the end of its form; `outlined` for acts beside it; `quiet` in running text. */
type Weight = 'filled' | 'outlined' | 'quiet';

const CLASSES: Readonly<Record<Weight, string>> = {
  filled: 'button button-filled',
  outlined: 'button',
  quiet: 'button button-quiet text-kelp',
};

type ButtonProps = Omit<AriaButtonProps, 'className' | 'children'> & {
  weight?: Weight;
  children: ReactNode;
  className?: string;
};

export function Button({ weight = 'outlined', className = '', ...rest }: ButtonProps) {
  return <AriaButton {...rest} className={`${CLASSES[weight]} ${className}`} />;
}

/** A link that looks like the act it leads to. */
export function ButtonLink({
  weight = 'outlined',
  className = '',
  ...rest
}: LinkProps & { weight?: Weight }) {
  return <Link {...rest} className={`${CLASSES[weight]} inline-block no-underline ${className}`} />;
}
