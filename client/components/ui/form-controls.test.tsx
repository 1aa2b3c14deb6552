import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it, vi } from 'vitest';
import { Button } from './button.tsx';
import { Dialog } from './dialog.tsx';
import { ErrorSummary } from './error-summary.tsx';
import { Field, Fieldset } from './field.tsx';
import { NumberInput, RadioGroup, TextInput } from './inputs.tsx';

describe('Field', () => {
  it('ties label, hint, error and what stands beside to the control', () => {
    render(
      <Field
        id="mass"
        label="Gross mass"
        hint="As your balance shows it."
        error="Type a number above zero."
        beside="0.9974 oz t"
      >
        {(ties) => <NumberInput {...ties} unit="g" />}
      </Field>,
    );
    const input = screen.getByRole('textbox', { name: 'Gross mass' });
    expect(input).toHaveAccessibleDescription(
      'As your balance shows it. Type a number above zero. 0.9974 oz t',
    );
    expect(input).toBeInvalid();
    expect(input).toBeRequired();
    expect(input).toHaveAttribute('inputmode', 'decimal');
    expect(input).toHaveAttribute('type', 'text');
    const error = screen.getByText('Type a number above zero.');
    expect(error.compareDocumentPosition(input)).toBe(Node.DOCUMENT_POSITION_FOLLOWING);
  });

  it('says that an optional field may be left out, and calls nothing wrong that is right', () => {
    render(
      <Field id="title" label="Title" optional>
        {(ties) => <TextInput {...ties} />}
      </Field>,
    );
    const input = screen.getByRole('textbox', { name: 'Title (may be left out)' });
    expect(input).toBeValid();
    expect(input).not.toBeRequired();
    expect(input).not.toHaveAttribute('aria-describedby');
  });

  it('asks a question of several controls by its legend', () => {
    render(
      <Fieldset id="paid" legend="Paid for?" error="Choose one.">
        <RadioGroup
          id="paid"
          name="paid"
          options={[
            { value: 'y', label: 'Yes' },
            { value: 'n', label: 'No' },
          ]}
        />
      </Fieldset>,
    );
    expect(screen.getByRole('group', { name: 'Paid for?' })).toHaveAccessibleDescription('Choose one.');
    expect(screen.getByRole('radio', { name: 'No' })).not.toBeChecked();
  });
});

function RefusedForm() {
  const [attempt, setAttempt] = useState(0);
  const items =
    attempt === 0
      ? []
      : [
          { fieldId: 'mass', message: 'Gross mass: type a number' },
          { fieldId: null, message: 'Too late' },
        ];
  return (
    <form>
      <ErrorSummary items={items} attempt={attempt} />
      <Field id="mass" label="Gross mass">
        {(ties) => <TextInput {...ties} />}
      </Field>
      <Button onClick={() => setAttempt(attempt + 1)}>Submit</Button>
    </form>
  );
}

describe('ErrorSummary', () => {
  it('takes the focus at every failed try, leads to the field, and marks the title', async () => {
    document.title = 'Draft · Scruple';
    const user = userEvent.setup();
    const { unmount } = render(<RefusedForm />);
    expect(screen.queryByRole('alert')).toBeNull();
    for (let tries = 0; tries < 2; tries += 1) {
      await user.click(screen.getByRole('button', { name: 'Submit' }));
      const alert = screen.getByRole('alert');
      expect(alert).toHaveTextContent('2 things need another look');
      expect(alert.parentElement).toHaveFocus();
    }
    expect(document.title).toBe('Error: Draft · Scruple');
    await user.click(screen.getByRole('link', { name: 'Gross mass: type a number' }));
    expect(screen.getByRole('textbox', { name: 'Gross mass' })).toHaveFocus();
    expect(screen.getByText('Too late').closest('a')).toBeNull();
    unmount();
    expect(document.title).toBe('Draft · Scruple');
  });
});

describe('Button', () => {
  it('acts no second time while it is busy, and stays where the focus is', async () => {
    const act = vi.fn();
    const user = userEvent.setup();
    const { rerender } = render(<Button onClick={act}>Pay</Button>);
    await user.click(screen.getByRole('button', { name: 'Pay' }));
    rerender(
      <Button onClick={act} busy busyText="Paying…">
        Pay
      </Button>,
    );
    await user.click(screen.getByRole('button', { name: 'Paying…' }));
    expect(act).toHaveBeenCalledTimes(1);
    expect(screen.getByRole('button')).toHaveFocus();
  });
});

describe('Dialog', () => {
  it('opens as a modal with its title and tells when it closes', async () => {
    const close = vi.fn();
    render(
      <Dialog open onClose={close} title="Photo 1 of 4">
        <p>Picture</p>
      </Dialog>,
    );
    expect(screen.getByRole('dialog', { name: 'Photo 1 of 4' })).toBeVisible();
    await userEvent.click(screen.getByRole('button', { name: 'Close' }));
    expect(close).toHaveBeenCalledTimes(1);
  });
});
