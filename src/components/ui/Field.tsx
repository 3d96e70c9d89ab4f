import type {
  InputHTMLAttributes,
  ReactNode,
  SelectHTMLAttributes,
  TextareaHTMLAttributes,
} from 'react';
import { Icon } from './Icon';

interface FieldFrame {
  id: string;
  label: ReactNode;
  note?: ReactNode | undefined;
  error?: string | undefined;
}

function described({ id, note, error }: FieldFrame) {
  const ids = [error ? `${id}-error` : '', note ? `${id}-note` : ''].filter(Boolean).join(' ');
  return {
    id,
    className: 'field__control',
    'aria-invalid': error ? (true as const) : undefined,
    'aria-describedby': ids || undefined,
  };
}

function Frame({ id, label, note, error, children }: FieldFrame & { children: ReactNode }) {
  return (
    <div className="field">
      <label className="field__label" htmlFor={id}>
        {label}
      </label>
      {children}
      {error ? (
        <p className="field__error" id={`${id}-error`}>
          <Icon name="circleAlert" />
          <span>{error}</span>
        </p>
      ) : null}
      {note ? (
        <p className="field__note" id={`${id}-note`}>
          {note}
        </p>
      ) : null}
    </div>
  );
}

export function TextField({
  id,
  label,
  note,
  error,
  ...rest
}: FieldFrame & InputHTMLAttributes<HTMLInputElement> & { ref?: React.Ref<HTMLInputElement> }) {
  const frame = { id, label, note, error };
  return (
    <Frame {...frame}>
      <input type="text" {...rest} {...described(frame)} />
    </Frame>
  );
}

export function SelectField({
  id,
  label,
  note,
  error,
  children,
  ...rest
}: FieldFrame & SelectHTMLAttributes<HTMLSelectElement> & { ref?: React.Ref<HTMLSelectElement> }) {
  const frame = { id, label, note, error };
  return (
    <Frame {...frame}>
      <select {...rest} {...described(frame)}>
        {children}
      </select>
    </Frame>
  );
}

/**
 * A list of which one is chosen. For pages: options that stand between the tags of a `SelectField` in .astro are
 * unknown to React, so its `defaultValue` would choose none of them.
 */
export function ChoiceField({
  options,
  ...rest
}: FieldFrame & {
  options: readonly { value: string; label: string }[];
} & Omit<SelectHTMLAttributes<HTMLSelectElement>, 'children'>) {
  return (
    <SelectField {...rest}>
      {options.map(({ value, label }) => (
        <option key={value} value={value}>
          {label}
        </option>
      ))}
    </SelectField>
  );
}

export function TextAreaField({
  id,
  label,
  note,
  error,
  ...rest
}: FieldFrame &
  TextareaHTMLAttributes<HTMLTextAreaElement> & { ref?: React.Ref<HTMLTextAreaElement> }) {
  const frame = { id, label, note, error };
  return (
    <Frame {...frame}>
      <textarea rows={3} {...rest} {...described(frame)} />
    </Frame>
  );
}

export function CheckField({
  id,
  label,
  note,
  ...rest
}: Omit<FieldFrame, 'error'> &
  InputHTMLAttributes<HTMLInputElement> & { ref?: React.Ref<HTMLInputElement> }) {
  return (
    <div className="field">
      <div className="check">
        <input
          type="checkbox"
          {...rest}
          id={id}
          aria-describedby={note ? `${id}-note` : undefined}
        />
        <label htmlFor={id}>{label}</label>
      </div>
      {note ? (
        <p className="field__note" id={`${id}-note`}>
          {note}
        </p>
      ) : null}
    </div>
  );
}
