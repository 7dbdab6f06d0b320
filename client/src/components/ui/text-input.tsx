import type { ComponentProps } from 'react';
import { classNames } from './button.tsx';
import { useFieldAttributes } from './field.tsx';

/** One line of text. Also for passwords, mail addresses and dates. */
export function TextInput({ className, ...rest }: ComponentProps<'input'>) {
  const wiring = useFieldAttributes(rest);
  return <input type="text" {...rest} {...wiring} className={classNames('control', className)} />;
}

/** Several lines of text. */
export function Textarea({ className, ...rest }: ComponentProps<'textarea'>) {
  const wiring = useFieldAttributes(rest);
  return <textarea rows={4} {...rest} {...wiring} className={classNames('control', className)} />;
}
