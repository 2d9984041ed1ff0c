import type { Ref } from 'react';
import { FieldBox, FieldNotes, useFieldIds, type FieldFrameProps } from './field';
import { Icon } from './icon';

export type Option<Value extends string> = { value: Value; label: string; disabled?: boolean };

export type SelectFieldProps<Value extends string> = FieldFrameProps & {
  value: Value;
  options: readonly Option<Value>[];
  onChange: (value: Value) => void;
  onBlur?: () => void;
  name?: string;
  disabled?: boolean;
  ref?: Ref<HTMLSelectElement>;
};

export function SelectField<Value extends string>(props: SelectFieldProps<Value>) {
  const { label, hint, error, value, options, onChange, ref } = props;
  const ids = useFieldIds(props);
  const pick = (text: string) => {
    const chosen = options.find((option) => option.value === text);
    if (chosen) onChange(chosen.value);
  };
  return (
    <div>
      <FieldBox invalid={error !== undefined} disabled={props.disabled}>
        <label className="field-label" htmlFor={ids.control}>
          {label}
        </label>
        <select
          ref={ref}
          className="field-input field-select"
          id={ids.control}
          name={props.name}
          value={value}
          disabled={props.disabled}
          aria-invalid={error !== undefined}
          aria-describedby={ids.describedBy}
          onChange={(event) => pick(event.target.value)}
          onBlur={props.onBlur}
        >
          {options.map((option) => (
            <option key={option.value} value={option.value} disabled={option.disabled}>
              {option.label}
            </option>
          ))}
        </select>
        <span className="field-chevron">
          <Icon name="chevron" size={20} />
        </span>
      </FieldBox>
      <FieldNotes base={ids.base} hint={hint} error={error} />
    </div>
  );
}

export type ChoiceFieldProps<Value extends string> = FieldFrameProps & {
  value: Value;
  options: readonly Option<Value>[];
  onChange: (value: Value) => void;
};

/** Two to four choices in sight at once: native radio buttons, drawn as pills. */
export function ChoiceField<Value extends string>(props: ChoiceFieldProps<Value>) {
  const { label, hint, error, value, options, onChange } = props;
  const ids = useFieldIds(props);
  return (
    <div>
      <FieldBox invalid={error !== undefined}>
        <div
          className="choice"
          role="radiogroup"
          aria-labelledby={ids.label}
          aria-describedby={ids.describedBy}
        >
          <span className="field-label" id={ids.label}>
            {label}
          </span>
          {options.map((option) => (
            <label key={option.value} className="pill">
              <input
                className="visually-hidden"
                type="radio"
                name={ids.base}
                value={option.value}
                checked={option.value === value}
                disabled={option.disabled}
                onChange={() => onChange(option.value)}
              />
              {option.label}
            </label>
          ))}
        </div>
      </FieldBox>
      <FieldNotes base={ids.base} hint={hint} error={error} />
    </div>
  );
}
