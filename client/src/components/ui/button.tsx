import type { ComponentProps, MouseEvent, ReactNode } from 'react';
import { useRef } from 'react';
import { Link } from 'react-router-dom';

export type ButtonKind = 'primary' | 'plain' | 'danger' | 'bench' | 'slip' | 'slip-second' | 'quiet';

export interface ButtonProps extends Omit<ComponentProps<'button'>, 'onClick'> {
  /**
   * primary: the one thing to do here · plain: anything else · danger: cannot be undone · bench: 72 px for gloves ·
   * slip, slip-second: on the alert slab · quiet: as a link in text.
   */
  kind?: ButtonKind;
  /** While true the button stays focusable, says it waits and ignores presses. */
  isPending?: boolean;
  /** May return a promise; until it settles further presses are ignored. */
  onClick?: (event: MouseEvent<HTMLButtonElement>) => unknown;
  children: ReactNode;
}

/** A button that never acts twice: presses are ignored while the action runs. */
export function Button({
  kind = 'plain',
  isPending = false,
  onClick,
  className,
  children,
  ...rest
}: ButtonProps) {
  const isRunning = useRef(false);
  const press = (event: MouseEvent<HTMLButtonElement>) => {
    if (isPending || isRunning.current) {
      event.preventDefault();
      return;
    }
    const outcome = onClick?.(event);
    if (!(outcome instanceof Promise)) return;
    isRunning.current = true;
    const settle = () => {
      isRunning.current = false;
    };
    void outcome.then(settle, settle);
  };
  return (
    <button
      type="button"
      {...rest}
      className={classNames('button', `button-${kind}`, isPending && 'is-pending button-waits', className)}
      aria-disabled={isPending || undefined}
      aria-busy={isPending || undefined}
      onClick={press}
    >
      {children}
    </button>
  );
}

export interface ButtonLinkProps extends ComponentProps<typeof Link> {
  kind?: ButtonKind;
}

/** A link that looks like a button: it goes somewhere, so it is a link. */
export function ButtonLink({ kind = 'plain', className, ...rest }: ButtonLinkProps) {
  return <Link {...rest} className={classNames('button', `button-${kind}`, className)} />;
}

/** Class names that apply, in one string. */
export function classNames(...names: (string | false | null | undefined)[]): string {
  return names.filter(Boolean).join(' ');
}
