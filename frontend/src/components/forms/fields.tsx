import Form from 'antd/es/form';
import Input from 'antd/es/input';
import Select from 'antd/es/select';
import type { ReactNode } from 'react';
import { parseNumber } from '../../lib/formatting/format';

interface FieldProps {
  /** Key of the form's values; a path where the values hold a list. */
  name: string | (string | number)[];
  label: string;
  hint?: ReactNode;
  /** Said when the field was left empty; without it the field may stay empty. */
  required?: string;
}

const NOT_A_FIGURE = 'Write a figure, such as 12.5 or 12,5.';

export function TextField({
  name,
  label,
  hint,
  required,
  maxLength,
  placeholder,
  lines,
  autoComplete = 'off',
  type,
}: FieldProps & {
  maxLength?: number;
  placeholder?: string;
  lines?: number;
  autoComplete?: string;
  type?: 'text' | 'password';
}) {
  return (
    <Form.Item
      name={name}
      label={optionalLabel(label, required)}
      extra={hint}
      rules={required ? [{ required: true, whitespace: true, message: required }] : []}
    >
      {lines ? (
        <Input.TextArea
          // Growing with the text would need a measuring element that the content security policy leaves unstyled.
          rows={lines}
          maxLength={maxLength}
          placeholder={placeholder}
        />
      ) : (
        <Input type={type} maxLength={maxLength} placeholder={placeholder} autoComplete={autoComplete} />
      )}
    </Form.Item>
  );
}

/** A figure as text, decimal comma or point; the form's value stays what was typed. See `figureOf`. */
export function NumberField({
  name,
  label,
  hint,
  required,
  unit,
  whole = false,
  between,
}: FieldProps & {
  unit?: string;
  whole?: boolean;
  /** Bounds the figure must keep, for figures that do not travel as they are typed. */
  between?: [lowest: number, highest: number];
}) {
  return (
    <Form.Item
      name={name}
      label={optionalLabel(label, required)}
      extra={hint}
      rules={[
        ...(required ? [{ required: true, whitespace: true, message: required }] : []),
        {
          validator: (_rule, value: unknown) => {
            if (typeof value !== 'string' || value.trim() === '') return Promise.resolve();
            const figure = parseNumber(value);
            if (figure === null) return Promise.reject(new Error(NOT_A_FIGURE));
            if (between && (figure < between[0] || figure > between[1])) {
              return Promise.reject(new Error(`Write a figure from ${between[0]} to ${between[1]}.`));
            }
            return Promise.resolve();
          },
        },
      ]}
    >
      <Input inputMode={whole ? 'numeric' : 'decimal'} autoComplete="off" suffix={unit} />
    </Form.Item>
  );
}

/** A calendar day through the browser's own picker: small, known, and it works on a phone. */
export function DayField({ name, label, hint, required, max }: FieldProps & { max?: string }) {
  return (
    <Form.Item
      name={name}
      label={optionalLabel(label, required)}
      extra={hint}
      rules={required ? [{ required: true, message: required }] : []}
    >
      <Input type="date" max={max} />
    </Form.Item>
  );
}

export interface ChoiceGroup {
  label: string;
  options: Choice[];
}

export interface Choice {
  value: string;
  label: string;
}

export function ChoiceField({
  name,
  label,
  hint,
  required,
  choices,
  placeholder = 'Choose',
  searchable = false,
  clearable = false,
  onChange,
  disabled,
}: FieldProps & {
  choices: (Choice | ChoiceGroup)[];
  placeholder?: string;
  searchable?: boolean;
  clearable?: boolean;
  onChange?: (value: string) => void;
  disabled?: boolean;
}) {
  return (
    <Form.Item
      name={name}
      label={optionalLabel(label, required)}
      extra={hint}
      rules={required ? [{ required: true, message: required }] : []}
    >
      <Select<string, Choice | ChoiceGroup>
        options={choices}
        placeholder={placeholder}
        showSearch={searchable ? { optionFilterProp: 'label' } : false}
        allowClear={clearable}
        onChange={onChange}
        disabled={disabled}
      />
    </Form.Item>
  );
}

function optionalLabel(label: string, required: string | undefined): ReactNode {
  return required ? (
    label
  ) : (
    <span>
      {label} <span className="soft">(optional)</span>
    </span>
  );
}

/** The figure behind a typed text: null for an empty field, NaN (which every contract refuses) for no figure. */
export function figureOf(text: string | undefined): number | null {
  if (text === undefined || text.trim() === '') return null;
  return parseNumber(text) ?? Number.NaN;
}

/** A stored figure as a field shows it, in the person's decimal mark. */
export function figureText(value: number | null | undefined, decimalComma: boolean): string {
  if (value === null || value === undefined) return '';
  const text = String(Math.round(value * 1e6) / 1e6);
  return decimalComma ? text.replace('.', ',') : text;
}
