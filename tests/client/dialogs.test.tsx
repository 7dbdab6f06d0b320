import { cleanup, render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, expect, it } from 'vitest';
import { Button } from '../../client/src/components/ui/button.tsx';
import { ConfirmDialog } from '../../client/src/components/ui/confirm-dialog.tsx';
import { Field } from '../../client/src/components/ui/field.tsx';
import { NumberInput } from '../../client/src/components/ui/number-input.tsx';

afterEach(cleanup);

function Retiring({ retire }: { retire: (reason: string) => Promise<unknown> }) {
  const [isOpen, setIsOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setIsOpen(true)}>Retire…</Button>
      <ConfirmDialog
        isOpen={isOpen}
        onClose={() => setIsOpen(false)}
        title="Retire probe 4E-2217"
        confirmLabel="Retire probe"
        isDanger
        asksReason
        onConfirm={retire}
      />
    </>
  );
}

const open = () => userEvent.click(screen.getByRole('button', { name: 'Retire…' }));
const confirm = () => userEvent.click(screen.getByRole('button', { name: 'Retire probe' }));

it('does nothing before a reason is written, and says what is missing', async () => {
  const retired: string[] = [];
  render(<Retiring retire={async (reason) => retired.push(reason)} />);
  await open();
  await confirm();
  expect(retired).toEqual([]);
  const field = screen.getByRole('textbox', { name: 'Reason' });
  expect(field.getAttribute('aria-invalid')).toBe('true');
  expect(screen.getByText(/Write the reason in a few words/)).toBeTruthy();
});

it('passes the reason on, trimmed, and closes when it is done', async () => {
  const retired: string[] = [];
  render(<Retiring retire={async (reason) => retired.push(reason)} />);
  await open();
  await userEvent.type(screen.getByRole('textbox', { name: 'Reason' }), ' glass cracked ');
  await confirm();
  expect(retired).toEqual(['glass cracked']);
  expect(screen.queryByRole('dialog')).toBeNull();
});

it('stays open with what was typed when the server refuses', async () => {
  render(<Retiring retire={() => Promise.reject(new Error('Somebody changed this probe meanwhile.'))} />);
  await open();
  await userEvent.type(screen.getByRole('textbox', { name: 'Reason' }), 'glass cracked');
  await confirm();
  expect(await screen.findByText('Somebody changed this probe meanwhile.')).toBeTruthy();
  expect((screen.getByRole('textbox', { name: 'Reason' }) as HTMLTextAreaElement).value).toBe(
    'glass cracked',
  );
});

it('begins empty the next time it is opened', async () => {
  render(<Retiring retire={() => Promise.resolve()} />);
  await open();
  await userEvent.type(screen.getByRole('textbox', { name: 'Reason' }), 'a first thought');
  await userEvent.click(screen.getByRole('button', { name: 'Leave as it is' }));
  await open();
  expect((screen.getByRole('textbox', { name: 'Reason' }) as HTMLTextAreaElement).value).toBe('');
});

it('acts once however often a button is pressed while the action runs', async () => {
  let started = 0;
  let finish = () => undefined as void;
  const save = () => {
    started += 1;
    return new Promise<void>((resolve) => {
      finish = resolve;
    });
  };
  render(<Button onClick={save}>Save</Button>);
  const button = screen.getByRole('button', { name: 'Save' });
  await userEvent.dblClick(button);
  await userEvent.click(button);
  expect(started).toBe(1);
  finish();
  await userEvent.click(button);
  expect(started).toBe(2);
});

it('does not submit a form while pending', async () => {
  let submitted = 0;
  render(
    <form
      onSubmit={(event) => {
        event.preventDefault();
        submitted += 1;
      }}
    >
      <Button type="submit" isPending>
        Save
      </Button>
    </form>,
  );
  await userEvent.click(screen.getByRole('button'));
  expect(submitted).toBe(0);
});

function ConstantField() {
  const [value, setValue] = useState<number | null>(null);
  return (
    <>
      <Field label="Cell constant" error={Number.isNaN(value) ? 'Write a number, such as 0.5118.' : null}>
        <NumberInput value={value} onChange={setValue} unit="cm⁻¹" />
      </Field>
      <output>{String(value)}</output>
    </>
  );
}

it('reads a decimal comma, keeps the text as typed and names the unit', async () => {
  render(<ConstantField />);
  const field = screen.getByRole('textbox', { name: 'Cell constant' }) as HTMLInputElement;
  await userEvent.type(field, '0,510');
  expect(screen.getByRole('status').textContent).toBe('0.51');
  expect(field.value).toBe('0,510');
  expect(document.getElementById(field.getAttribute('aria-describedby') ?? '')?.textContent).toBe('cm⁻¹');
});

it('says what to write when the text is no number, and forgives when it is again', async () => {
  render(<ConstantField />);
  const field = screen.getByRole('textbox', { name: 'Cell constant' });
  await userEvent.type(field, '0.5x');
  expect(screen.getByText('Write a number, such as 0.5118.')).toBeTruthy();
  expect(field.getAttribute('aria-invalid')).toBe('true');
  await userEvent.type(field, '{Backspace}');
  expect(screen.queryByText('Write a number, such as 0.5118.')).toBeNull();
});
