import { emptyRateCard, type RateCardView } from '@kerfyard/common/people';
import { cleanup, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { loadWords } from '../../../lib/i18n.ts';
import { answerRequests, problem } from '../../../test/answers.ts';
import { renderInApp } from '../../../test/render.tsx';
import { RateCardForm } from './rate-card-form.tsx';

const view: RateCardView = { card: null, version: 0, updatedAt: null };
const path = 'PUT /api/company/rate-card';

beforeEach(() => loadWords(['rate-card']));
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const csv = (text: string) => new File([text], 'rates.csv', { type: 'text/csv' });
const fileInput = () => {
  const input = document.querySelector('input[type="file"]');
  if (!(input instanceof HTMLInputElement)) throw new Error('no file input');
  return input;
};

describe('the rate card’s form', () => {
  it('saves a rate typed by hand, to parts of a cent, with the version it began from', async () => {
    const seen = answerRequests({
      [path]: ({ body }) => ({ status: 200, body: { ...(body as object), version: 1 } }),
    });
    renderInApp(<RateCardForm view={view} canEdit />);
    await userEvent.click(screen.getByRole('button', { name: 'Add a rate' }));
    const row = screen.getByRole('listitem', { name: 'Rate 1' });
    await userEvent.type(within(row).getByLabelText(/Up to/), '6');
    await userEvent.type(within(row).getByLabelText('Rate'), '0.8525');
    await userEvent.type(screen.getByLabelText(/Heavy bar/), '1.5');
    await userEvent.click(screen.getByRole('button', { name: 'Save the rate card' }));
    expect((await screen.findAllByText('Rate card saved')).length).toBeGreaterThan(0);
    expect(seen[0]?.body).toMatchObject({
      version: 0,
      card: {
        rates: [{ method: 'flat_saw', kind: null, unit: 'in_ft', upToIn: 6, rate: 8_525 }],
        factors: { heavy_bar: 150 },
      },
    });
  });

  it('says what is missing beside its field and sends nothing', async () => {
    const seen = answerRequests({});
    renderInApp(<RateCardForm view={view} canEdit />);
    await userEvent.click(screen.getByRole('button', { name: 'Add a rate' }));
    await userEvent.click(screen.getByRole('button', { name: 'Save the rate card' }));
    expect(await screen.findByLabelText('Rate')).toHaveAccessibleDescription(/A rate in dollars/);
    expect(seen).toEqual([]);
  });

  it('shows the server’s complaint beside the field it names', async () => {
    answerRequests({
      [path]: () => problem(422, 'invalid_input', [{ path: 'card.minimumCents', message: 'Too much' }]),
    });
    renderInApp(<RateCardForm view={view} canEdit />);
    await userEvent.click(screen.getByRole('button', { name: 'Save the rate card' }));
    await vi.waitFor(() => expect(screen.getByLabelText('Minimum')).toHaveAccessibleDescription(/Too much/));
  });

  it('takes rates from a file, and nothing from one with a fault, which it names by row and column', async () => {
    renderInApp(<RateCardForm view={view} canEdit />);
    const head = 'method,kind,unit,up_to_in,rate\n';
    await userEvent.upload(fileInput(), csv(`${head}wall saw,,in ft,8,2.40\naxe,,in_ft,,1`));
    expect(await screen.findByText(/Row 3, method: axe will not do/)).toBeInTheDocument();
    expect(screen.queryByRole('listitem', { name: 'Rate 1' })).not.toBeInTheDocument();
    await userEvent.upload(fileInput(), csv(`${head}wall saw,,in ft,8,2.40\n`));
    const row = await screen.findByRole('listitem', { name: 'Rate 1' });
    expect(within(row).getByLabelText('Method')).toHaveValue('wall_saw');
    expect(within(row).getByLabelText('Rate')).toHaveValue('2.40');
    expect(screen.queryByText(/will not do/)).not.toBeInTheDocument();
  });

  it('is for reading only where the role does not hand in bids', () => {
    renderInApp(<RateCardForm view={{ ...view, card: emptyRateCard() }} canEdit={false} />);
    expect(screen.queryByRole('button', { name: 'Save the rate card' })).not.toBeInTheDocument();
    expect(screen.queryByRole('button', { name: 'Open rates from CSV' })).not.toBeInTheDocument();
    expect(screen.getByLabelText('Minimum')).toBeDisabled();
  });
});
