import type { ReactNode } from 'react';
import { createContext, useContext, useId } from 'react';

export interface FieldProps {
  label: string;
  /** What to enter and where to find it; always visible. */
  hint?: ReactNode;
  /** What is wrong and what to do; names the field by standing under it. */
  error?: string | null | undefined;
  isOptional?: boolean;
  children: ReactNode;
  className?: string;
}

interface FieldWiring {
  id: string;
  describedBy: string | undefined;
  isInvalid: boolean;
}

const FieldContext = createContext<FieldWiring | null>(null);

/** Label, control, hint and error of one field, wired for screen readers. Put one control of this kit inside. */
export function Field({ label, hint, error, isOptional = false, children, className }: FieldProps) {
  const id = useId();
  const hintId = hint ? `${id}-hint` : null;
  const errorId = error ? `${id}-error` : null;
  const describedBy = [errorId, hintId].filter(Boolean).join(' ') || undefined;
  return (
    <div className={className ? `field ${className}` : 'field'}>
      <label className="field-label" htmlFor={id}>
        {label}
        {isOptional ? <span className="field-optional"> (may stay empty)</span> : null}
      </label>
      <FieldContext value={{ id, describedBy, isInvalid: Boolean(error) }}>{children}</FieldContext>
      {error ? (
        <p className="field-error" id={errorId ?? undefined}>
          {error}
        </p>
      ) : null}
      {hint ? (
        <p className="field-hint" id={hintId ?? undefined}>
          {hint}
        </p>
      ) : null}
    </div>
  );
}

/** The attributes a control takes from the field around it; its own win. */
export function useFieldAttributes(own: {
  id?: string | undefined;
  'aria-describedby'?: string | undefined;
}) {
  const field = useContext(FieldContext);
  return {
    id: own.id ?? field?.id,
    'aria-describedby': own['aria-describedby'] ?? field?.describedBy,
    'aria-invalid': field?.isInvalid || undefined,
  };
}

export interface FieldGroupProps {
  legend: string;
  hint?: ReactNode;
  error?: string | null | undefined;
  children: ReactNode;
}

/** Several choices under one question. */
export function FieldGroup({ legend, hint, error, children }: FieldGroupProps) {
  const id = useId();
  return (
    <fieldset aria-describedby={error || hint ? `${id}-note` : undefined}>
      <legend className="field-label">{legend}</legend>
      {children}
      <div id={`${id}-note`}>
        {error ? <p className="field-error">{error}</p> : null}
        {hint ? <p className="field-hint">{hint}</p> : null}
      </div>
    </fieldset>
  );
}
