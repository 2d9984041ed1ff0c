import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { ChoiceField, SelectField } from '@/components/ui/select-field';
import { TextAreaField, TextField, type TextFieldProps } from '@/components/ui/text-field';

function describedBy(control: HTMLElement): string {
  const ids = control.getAttribute('aria-describedby')?.split(' ') ?? [];
  return ids.map((id) => document.getElementById(id)?.textContent).join(' | ');
}

function Volatility(props: Partial<TextFieldProps>) {
  const [value, setValue] = useState('24.5');
  return <TextField label="Volatility" value={value} onChangeText={setValue} {...props} />;
}

test('the label names the input, and a tap on it reaches the input', async () => {
  render(<Volatility />);
  await userEvent.click(screen.getByText('Volatility'));
  expect(document.activeElement).toBe(screen.getByLabelText('Volatility'));
});

test('unit, error and hint describe the input, and the error is announced', () => {
  render(<Volatility unit="%" error="Give a volatility above zero." hint="Per year." />);
  const input = screen.getByLabelText('Volatility');
  expect(input.getAttribute('aria-invalid')).toBe('true');
  expect(describedBy(input)).toBe('% | Give a volatility above zero. | Per year.');
  expect(screen.getByRole('alert').textContent).toBe('Give a volatility above zero.');
});

test('a field in order is not called invalid, and refers to nothing', () => {
  render(<Volatility />);
  const input = screen.getByLabelText('Volatility');
  expect(input.getAttribute('aria-invalid')).toBe('false');
  expect(input.getAttribute('aria-describedby')).toBeNull();
  expect(screen.queryByRole('alert')).toBeNull();
});

test('arrows step, ten times as far with shift; other keys type', async () => {
  const onStep = jest.fn();
  render(<Volatility onStep={onStep} selectAllOnFocus />);
  const user = userEvent.setup();
  await user.tab();
  await user.keyboard('{ArrowUp}{ArrowDown}{Shift>}{ArrowUp}{/Shift}');
  expect(onStep.mock.calls).toEqual([[1], [-1], [10]]);
  await user.keyboard('3');
  expect(screen.getByLabelText<HTMLInputElement>('Volatility').value).toBe('3');
});

test('a text area carries its error as an input does', () => {
  render(
    <TextAreaField label="Reason" value="" onChangeText={() => undefined} error="Give a reason." />,
  );
  expect(describedBy(screen.getByLabelText('Reason'))).toBe('Give a reason.');
});

test('a select hands over the chosen value', async () => {
  const onChange = jest.fn();
  const options = [
    { value: 'european', label: 'European' },
    { value: 'american', label: 'American' },
  ] as const;
  render(<SelectField label="Exercise" value="european" options={options} onChange={onChange} />);
  await userEvent.selectOptions(screen.getByLabelText('Exercise'), 'American');
  expect(onChange).toHaveBeenCalledWith('american');
});

test('a choice is a group of radio buttons, moved through by arrows', async () => {
  const onChange = jest.fn();
  const options = [
    { value: 'call', label: 'call' },
    { value: 'put', label: 'put' },
  ] as const;
  render(<ChoiceField label="Kind" value="call" options={options} onChange={onChange} />);
  expect(screen.getByRole('radiogroup', { name: 'Kind' })).toBeTruthy();
  expect(screen.getByRole<HTMLInputElement>('radio', { name: 'call' }).checked).toBe(true);
  await userEvent.click(screen.getByText('put'));
  expect(onChange).toHaveBeenCalledWith('put');
});
