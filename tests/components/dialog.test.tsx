import { fireEvent, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { TextField } from '@/components/ui/text-field';
import { playDialogs } from './browser';

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

function Page() {
  const [open, setOpen] = useState(false);
  const [typed, setTyped] = useState('');
  return (
    <>
      <Button label="Open" onPress={() => setOpen(true)} />
      <TextField label="Note" value={typed} onChangeText={setTyped} />
      <Dialog title="A question" open={open} onClose={() => setOpen(false)}>
        <p>Words</p>
      </Dialog>
    </>
  );
}

beforeEach(playDialogs);

test('it opens as a modal dialog that its heading names, with focus inside', async () => {
  render(<Page />);
  await userEvent.click(screen.getByRole('button', { name: 'Open' }));
  const dialog = screen.getByRole('dialog', { name: 'A question' });
  expect(dialog.tagName).toBe('DIALOG');
  expect(dialog.contains(document.activeElement)).toBe(true);
});

test.each([
  ['its close button', () => userEvent.click(screen.getByRole('button', { name: 'Close' }))],
  // The browser turns Escape into a cancel event.
  ['Escape', async () => fireEvent(screen.getByRole('dialog'), new Event('cancel'))],
  ['a tap beside it', () => userEvent.click(screen.getByRole('dialog'))],
])('%s closes it, and focus goes back to where it was', async (_, close) => {
  render(<Page />);
  const opener = screen.getByRole('button', { name: 'Open' });
  await userEvent.click(opener);
  await close();
  expect(screen.queryByRole('dialog')).toBeNull();
  expect(document.activeElement).toBe(opener);
});

test('where its act takes away what opened it, focus goes to the page', async () => {
  function Answerable() {
    const [state, setState] = useState<'asked' | 'open' | 'answered'>('asked');
    return (
      <main id="content" tabIndex={-1}>
        {state === 'answered' ? null : (
          <>
            <Button label="Open" onPress={() => setState('open')} />
            <Dialog title="A question" open={state === 'open'} onClose={() => setState('answered')}>
              <p>Words</p>
            </Dialog>
          </>
        )}
      </main>
    );
  }
  render(<Answerable />);
  await userEvent.click(screen.getByRole('button', { name: 'Open' }));
  await userEvent.click(screen.getByRole('button', { name: 'Close' }));
  expect(document.activeElement).toBe(screen.getByRole('main'));
});

test('a tap inside leaves it open, and the page behind keeps what was typed', async () => {
  render(<Page />);
  await userEvent.type(screen.getByLabelText('Note'), 'kept');
  await userEvent.click(screen.getByRole('button', { name: 'Open' }));
  await userEvent.click(screen.getByText('Words'));
  expect(screen.getByRole('dialog')).toBeTruthy();
  expect(screen.getByLabelText<HTMLInputElement>('Note').value).toBe('kept');
});

test('a busy button takes no second press, and keeps its focus', async () => {
  const onPress = jest.fn();
  render(<Button label="Save" busy onPress={onPress} />);
  const button = screen.getByRole('button', { name: 'Save' });
  await userEvent.click(button);
  expect(onPress).not.toHaveBeenCalled();
  expect(button.getAttribute('aria-busy')).toBe('true');
  expect(document.activeElement).toBe(button);
});
