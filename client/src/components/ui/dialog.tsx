import type { ReactNode } from 'react';
import { useEffect, useId, useRef } from 'react';
import { classNames } from './button.tsx';

export interface DialogProps {
  isOpen: boolean;
  /** Escape, or a press on the backdrop. Not called while `isLocked`. */
  onClose: () => void;
  title: string;
  /** One or two sentences: what this does. */
  sentence?: ReactNode;
  children?: ReactNode;
  /** The buttons, the main one first. */
  actions?: ReactNode;
  isWide?: boolean;
  /** While something is being saved, or a secret shown once: neither Escape nor the backdrop closes. */
  isLocked?: boolean;
  className?: string;
}

/**
 * A modal dialog on the browser's own element: focus stays inside and returns, the rest of the page is inert. (Modal
 * primitives that inject a style element to lock scrolling are refused by the content policy.)
 */
export function Dialog({
  isOpen,
  onClose,
  title,
  sentence,
  children,
  actions,
  isWide = false,
  isLocked = false,
  className,
}: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const id = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (!dialog || !isOpen) return undefined;
    const opener = document.activeElement;
    if (!dialog.open) dialog.showModal();
    return () => {
      dialog.close();
      if (opener instanceof HTMLElement) opener.focus();
    };
  }, [isOpen]);
  if (!isOpen) return null;
  return (
    <dialog
      ref={ref}
      className={classNames('dialog', isWide && 'dialog-wide', className)}
      aria-labelledby={`${id}-title`}
      aria-describedby={sentence ? `${id}-sentence` : undefined}
      onCancel={(event) => {
        event.preventDefault();
        if (!isLocked) onClose();
      }}
      onPointerDown={(event) => {
        if (event.target === event.currentTarget && !isLocked) onClose();
      }}
    >
      <div className="dialog-body">
        <h2 className="dialog-title" id={`${id}-title`}>
          {title}
        </h2>
        {sentence ? (
          <p className="dialog-sentence" id={`${id}-sentence`}>
            {sentence}
          </p>
        ) : null}
        {children ? <div className="dialog-content">{children}</div> : null}
        {actions ? <div className="dialog-actions">{actions}</div> : null}
      </div>
    </dialog>
  );
}
