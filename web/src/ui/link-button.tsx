import { Link, type LinkProps } from 'react-router-dom';
import { buttonClasses, type ButtonSize, type ButtonTone } from './button.tsx';

/** A link to another page of Oriel that looks like a button. */
export function LinkButton({ tone, size, className, ...rest }: LinkProps & { tone?: ButtonTone; size?: ButtonSize }) {
  return <Link {...rest} className={buttonClasses(tone, size, className)} />;
}

/** The same for a file to fetch or an address elsewhere: the browser follows it, not the router. */
export function AnchorButton({
  tone,
  size,
  className,
  ...rest
}: React.AnchorHTMLAttributes<HTMLAnchorElement> & { tone?: ButtonTone; size?: ButtonSize }) {
  return <a {...rest} className={buttonClasses(tone, size, className)} />;
}
