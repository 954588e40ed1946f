import { type InputHTMLAttributes, type ReactNode, type SelectHTMLAttributes, useId } from 'react';

export const inputLook =
  'min-h-7 w-full min-w-0 border-0 border-b border-rule bg-field px-2 py-0.5 text-ink placeholder:text-ink3 aria-invalid:border-b-2 aria-invalid:border-ink max-margin:min-h-[34px]';

/** A label, its control, help under it and the error in words. The control gets the ids. */
export function Labelled({
  label,
  help,
  error,
  children,
}: {
  label: ReactNode;
  help?: ReactNode;
  error?: string | undefined;
  children: (ids: { id: string; 'aria-describedby'?: string; 'aria-invalid'?: true }) => ReactNode;
}) {
  const id = useId();
  const described = [help ? `${id}-help` : '', error ? `${id}-error` : ''].filter(Boolean).join(' ');
  return (
    <div className="flex flex-col gap-1">
      <label htmlFor={id} className="text-small">
        {label}
      </label>
      {children({
        id,
        ...(described ? { 'aria-describedby': described } : {}),
        ...(error ? { 'aria-invalid': true as const } : {}),
      })}
      {help ? (
        <p id={`${id}-help`} className="text-ink3 text-least">
          {help}
        </p>
      ) : null}
      {error ? <FieldError id={`${id}-error`}>{error}</FieldError> : null}
    </div>
  );
}

export function FieldError({ id, children }: { id?: string; children: ReactNode }) {
  return (
    <p id={id} role="alert" className="border-ink border-l-2 pl-2 font-semibold text-least">
      {children}
    </p>
  );
}

type Common = { label: ReactNode; help?: ReactNode; error?: string | undefined };

export function TextField({ label, help, error, ...rest }: Common & InputHTMLAttributes<HTMLInputElement>) {
  return (
    <Labelled label={label} help={help} error={error}>
      {(ids) => <input {...rest} {...ids} className={`num ${inputLook}`} />}
    </Labelled>
  );
}

export function SelectField({
  label,
  help,
  error,
  children,
  ...rest
}: Common & SelectHTMLAttributes<HTMLSelectElement>) {
  return (
    <Labelled label={label} help={help} error={error}>
      {(ids) => (
        <select {...rest} {...ids} className={`text-small ${inputLook}`}>
          {children}
        </select>
      )}
    </Labelled>
  );
}
