import type { ButtonHTMLAttributes } from 'react';
import { Link, type LinkProps } from 'react-router-dom';
import styles from './plain-button.module.css';

type Weight = 'outline' | 'primary';

/** A button for the pages and places that do not load antd; looks the same beside antd's. */
export function PlainButton({
  weight = 'outline',
  className,
  ...rest
}: ButtonHTMLAttributes<HTMLButtonElement> & { weight?: Weight }) {
  return <button type="button" {...rest} className={[styles.button, styles[weight], className].join(' ')} />;
}

/** A link that is the next step of a page, drawn as a button. */
export function ButtonLink({ weight = 'outline', className, ...rest }: LinkProps & { weight?: Weight }) {
  return <Link {...rest} className={[styles.button, styles[weight], className].join(' ')} />;
}
