/** Why the whole form was refused, above its buttons. */
export function FormRefusal({ children }: { children: string | null }) {
  return children ? (
    <p className="field-error" role="alert">
      {children}
    </p>
  ) : null;
}
