import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { ApiError } from '../../lib/api-error.ts';
import { useAppForm } from '../../lib/app-form.ts';
import { renderInApp } from '../../test/render.tsx';
import { TextField } from './fields.tsx';
import { Form } from './form.tsx';
import { MoneyField, NumberField, readCents, readNumber } from './number-fields.tsx';

const schema = z.strictObject({
  name: z.string().min(1, 'Write something here'),
  depthIn: z.number('A number of in').min(1, 'At least 1 in'),
  priceCents: z.number().int().min(100, 'At least $1'),
});
type Values = z.infer<typeof schema>;

function Sample({ onSubmit }: { onSubmit: (values: Values) => Promise<void> | void }) {
  const form = useAppForm({ schema, defaultValues: { name: '' } });
  return (
    <Form form={form} onSubmit={onSubmit} label="Sample">
      <TextField control={form.control} name="name" label="Name" hint="As on the truck" />
      <NumberField control={form.control} name="depthIn" label="Depth" unit="in" />
      <MoneyField control={form.control} name="priceCents" label="Price" />
      <button type="submit">Send</button>
    </Form>
  );
}

describe('Form', () => {
  it('shows all mistakes at once beside their fields and in a summary, and focuses the first', async () => {
    renderInApp(<Sample onSubmit={() => undefined} />);
    await userEvent.click(screen.getByRole('button', { name: 'Send' }));
    const summary = await screen.findByText('3 fields need another look.');
    expect(within(summary.parentElement as HTMLElement).getAllByRole('button')).toHaveLength(3);
    const name = screen.getByLabelText('Name');
    expect(name).toHaveFocus();
    expect(name).toBeInvalid();
    expect(name).toHaveAccessibleDescription('Write something here As on the truck');
    expect(screen.getByLabelText('Depth')).toHaveAccessibleDescription('A number of in');
  });

  it("puts the server's complaints beside their fields, keeps what was typed, and says the rest above", async () => {
    renderInApp(
      <Sample
        onSubmit={() =>
          Promise.reject(
            new ApiError({
              code: 'invalid_input',
              status: 422,
              message: 'Some fields need another look.',
              fields: [
                { path: 'depthIn', message: 'Deeper than the slab' },
                { path: 'name', message: 'Taken already' },
                { path: 'site.zip', message: 'The site has no ZIP code' },
              ],
            }),
          )
        }
      />,
    );
    await userEvent.type(screen.getByLabelText('Name'), 'Bay 4');
    await userEvent.type(screen.getByLabelText('Depth'), '12.5');
    await userEvent.type(screen.getByLabelText('Price'), '1,250.5');
    await userEvent.click(screen.getByRole('button', { name: 'Send' }));
    await waitFor(() => expect(screen.getByLabelText('Name')).toBeInvalid());
    expect(screen.getByLabelText('Depth')).toHaveAccessibleDescription('Deeper than the slab');
    expect(screen.getByLabelText('Depth')).toHaveFocus();
    expect(screen.getByRole('alert')).toHaveTextContent('The site has no ZIP code');
    expect(screen.getByLabelText('Name')).toHaveValue('Bay 4');
    expect(screen.getByLabelText('Depth')).toHaveValue('12.5');
  });

  it('sends numbers as numbers and money as whole cents', async () => {
    const sent: Values[] = [];
    renderInApp(<Sample onSubmit={(values) => void sent.push(values)} />);
    await userEvent.type(screen.getByLabelText('Name'), 'Bay 4');
    await userEvent.type(screen.getByLabelText('Depth'), '12.');
    await userEvent.type(screen.getByLabelText('Price'), '$1,250.5');
    await userEvent.click(screen.getByRole('button', { name: 'Send' }));
    await waitFor(() => expect(sent).toEqual([{ name: 'Bay 4', depthIn: 12, priceCents: 125_050 }]));
  });
});

describe('reading typed figures', () => {
  it.each([
    ['', null],
    ['1,234.5', 1234.5],
    ['.5', 0.5],
    ['12.', 12],
    ['abc', 'abc'],
    ['1e309', '1e309'],
  ])('number %j', (text, expected) => expect(readNumber(text)).toBe(expected));
  it.each([
    ['', null],
    ['12', 1200],
    ['12.3', 1230],
    ['12.34', 1234],
    ['.07', 7],
    ['12.345', '12.345'],
    ['-5', '-5'],
    ['.', '.'],
  ])('cents %j', (text, expected) => expect(readCents(text)).toBe(expected));
});
