import { Button, Link as ThemeLink } from '@radix-ui/themes';
import type { ComponentProps, ReactNode } from 'react';
import { Link } from 'react-router-dom';

type ThemeLinkProps = Omit<ComponentProps<typeof ThemeLink>, 'href' | 'asChild'>;

/** A link inside the app, in the theme's look. */
export function TextLink({ to, children, ...rest }: ThemeLinkProps & { to: string; children: ReactNode }) {
  return (
    <ThemeLink asChild underline="always" {...rest}>
      <Link to={to}>{children}</Link>
    </ThemeLink>
  );
}

type ButtonProps = Omit<ComponentProps<typeof Button>, 'asChild' | 'onClick'>;

/** A link that looks like a button: for going somewhere, never for doing something. */
export function ButtonLink({ to, children, ...rest }: ButtonProps & { to: string; children: ReactNode }) {
  return (
    <Button asChild {...rest}>
      <Link to={to}>{children}</Link>
    </Button>
  );
}
