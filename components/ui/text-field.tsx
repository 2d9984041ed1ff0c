import type { InputHTMLAttributes, KeyboardEvent, ReactNode, Ref } from 'react';
import { FieldBox, FieldNotes, useFieldIds, type FieldFrameProps } from './field';

export type TextFieldProps = FieldFrameProps & {
  value: string;
  onChangeText: (text: string) => void;
  onBlur?: () => void;
  name?: string;
  type?: 'text' | 'email' | 'password' | 'date' | 'search';
  /** Follows the typed value, as in `24.5 %`. */
  unit?: string;
  /** Stands at the right of the value, such as a resolved date. */
  trailing?: ReactNode;
  /** Stands at the right of the label: a link-button that helps to fill the field. */
  labelAction?: ReactNode;
  inputMode?: InputHTMLAttributes<HTMLInputElement>['inputMode'];
  autoComplete?: string;
  placeholder?: string;
  autoFocus?: boolean;
  disabled?: boolean;
  required?: boolean;
  maxLength?: number;
  selectAllOnFocus?: boolean;
  /** Arrow keys: up 1, down −1, ten times as much with shift held. */
  onStep?: (steps: number) => void;
  ref?: Ref<HTMLInputElement>;
};

function stepOf(event: KeyboardEvent): number {
  const size = event.shiftKey ? 10 : 1;
  if (event.key === 'ArrowUp') return size;
  return event.key === 'ArrowDown' ? -size : 0;
}

export function TextField(props: TextFieldProps) {
  const { label, hint, error, value, onChangeText, unit, trailing, onStep, ref } = props;
  const ids = useFieldIds(props, unit);
  const onKeyDown = (event: KeyboardEvent) => {
    const steps = onStep ? stepOf(event) : 0;
    if (steps === 0) return;
    event.preventDefault();
    onStep?.(steps);
  };
  return (
    <div>
      <FieldBox invalid={error !== undefined} disabled={props.disabled}>
        <label className="field-label" htmlFor={ids.control}>
          {label}
        </label>
        <input
          ref={ref}
          className="field-input"
          data-unit={unit !== undefined}
          id={ids.control}
          name={props.name}
          type={props.type ?? 'text'}
          inputMode={props.inputMode}
          autoComplete={props.autoComplete ?? 'off'}
          autoCapitalize="none"
          spellCheck={false}
          placeholder={props.placeholder}
          autoFocus={props.autoFocus}
          disabled={props.disabled}
          maxLength={props.maxLength}
          value={value}
          aria-required={props.required}
          aria-invalid={error !== undefined}
          aria-describedby={ids.describedBy}
          onChange={(event) => onChangeText(event.target.value)}
          onBlur={props.onBlur}
          onFocus={props.selectAllOnFocus ? (event) => event.target.select() : undefined}
          onKeyDown={onKeyDown}
        />
        {unit ? (
          <span className="field-unit" id={`${ids.base}-unit`}>
            {unit}
          </span>
        ) : null}
        {trailing ? <span className="field-trailing">{trailing}</span> : null}
        {props.labelAction ? <span className="field-label-action">{props.labelAction}</span> : null}
      </FieldBox>
      <FieldNotes base={ids.base} hint={hint} error={error} />
    </div>
  );
}

export type TextAreaFieldProps = FieldFrameProps &
  Pick<TextFieldProps, 'value' | 'onChangeText' | 'onBlur' | 'name' | 'maxLength' | 'required'> & {
    ref?: Ref<HTMLTextAreaElement>;
  };

/** Several lines, for reasons and notes. */
export function TextAreaField(props: TextAreaFieldProps) {
  const { label, hint, error, value, onChangeText, ref } = props;
  const ids = useFieldIds(props);
  return (
    <div>
      <FieldBox invalid={error !== undefined}>
        <label className="field-label" htmlFor={ids.control}>
          {label}
        </label>
        <textarea
          ref={ref}
          className="field-input field-area"
          id={ids.control}
          name={props.name}
          maxLength={props.maxLength}
          value={value}
          aria-required={props.required}
          aria-invalid={error !== undefined}
          aria-describedby={ids.describedBy}
          onChange={(event) => onChangeText(event.target.value)}
          onBlur={props.onBlur}
        />
      </FieldBox>
      <FieldNotes base={ids.base} hint={hint} error={error} />
    </div>
  );
}

/** A small action inside a field or a sentence, such as `from premium`. */
export function LinkButton({
  label,
  onPress,
  expanded,
}: {
  label: string;
  onPress: () => void;
  expanded?: boolean;
}) {
  return (
    <button type="button" className="link-button" aria-expanded={expanded} onClick={onPress}>
      {label}
    </button>
  );
}
