import { fireEvent, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, it } from 'vitest';
import { z } from 'zod';
import { useAppForm } from '../../lib/app-form.ts';
import { renderInApp } from '../../test/render.tsx';
import { DateTimeField } from './date-time-field.tsx';
import { Form } from './form.tsx';

const schema = z.strictObject({ dueAt: z.iso.datetime({ offset: true }) });

function Sample({ dueAt, onSubmit }: { dueAt: string; onSubmit: (values: { dueAt: string }) => void }) {
  const form = useAppForm({ schema, defaultValues: { dueAt } });
  return (
    <Form form={form} onSubmit={onSubmit}>
      <DateTimeField control={form.control} name="dueAt" label="Bids due" timeZone="America/Chicago" />
      <button type="submit">Send</button>
    </Form>
  );
}

it('shows and takes the time of the site, and names its zone', async () => {
  const sent: { dueAt: string }[] = [];
  renderInApp(<Sample dueAt="2026-12-10T20:00:00.000Z" onSubmit={(values) => void sent.push(values)} />);
  const input = screen.getByLabelText('Bids due');
  expect(input).toHaveValue('2026-12-10T14:00');
  expect(screen.getByText('CST')).toBeInTheDocument();
  fireEvent.change(input, { target: { value: '2026-07-10T14:00' } });
  expect(screen.getByText('CDT')).toBeInTheDocument();
  await userEvent.click(screen.getByRole('button', { name: 'Send' }));
  expect(sent).toEqual([{ dueAt: '2026-07-10T19:00:00.000Z' }]);
});

it('leaves a year half typed as it is', () => {
  renderInApp(<Sample dueAt="2026-12-10T20:00:00.000Z" onSubmit={() => undefined} />);
  const input = screen.getByLabelText('Bids due');
  fireEvent.change(input, { target: { value: '0002-12-10T14:00' } });
  expect(input).toHaveValue('0002-12-10T14:00');
});
