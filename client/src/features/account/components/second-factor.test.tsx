import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeAll, expect, it, vi } from 'vitest';
import { loadWords } from '../../../lib/i18n.ts';
import { answerRequests, problem } from '../../../test/answers.ts';
import { renderInApp } from '../../../test/render.tsx';
import { SecondFactor } from './second-factor.tsx';

beforeAll(() => loadWords(['account']));
// Loaded on demand: not to be waited for in here.
beforeAll(() => import('./qr-code.tsx'));
afterEach(() => vi.unstubAllGlobals());

const none = { isSet: false, recoveryCodesLeft: 0, isRequired: false };
const begun = {
  secret: 'GEZDGNBVGY3TQOJQGEZDGNBVGY3TQOJQ',
  address: 'otpauth://totp/Kerfyard:milo%40north.example?secret=GEZDGNBVGY3TQOJQGEZDGNBVGY3TQOJQ',
};

it('shows the secret as picture and text, takes the first code, then shows the recovery codes once', async () => {
  const seen = answerRequests({
    'POST /api/account/second-factor': () => ({ status: 201, body: begun }),
    'POST /api/account/second-factor/confirm': [
      () => problem(422, 'invalid_input', [{ path: 'code', message: 'That code does not fit' }]),
      () => ({ status: 201, body: { codes: ['AAAA-BBBB', 'CCCC-DDDD'] } }),
    ],
  });
  renderInApp(<SecondFactor factor={none} />);
  await userEvent.click(screen.getByRole('button', { name: 'Set it up' }));
  expect(await screen.findByRole('img', { name: /QR code/ })).toBeInTheDocument();
  expect(screen.getByText('GEZD GNBV GY3T QOJQ GEZD GNBV GY3T QOJQ')).toBeInTheDocument();
  const code = screen.getByLabelText('First code');
  await userEvent.type(code, '000000{Enter}');
  await waitFor(() => expect(code).toHaveAccessibleDescription(/does not fit/));
  await userEvent.clear(code);
  await userEvent.paste('123 456');
  await userEvent.click(screen.getByRole('button', { name: 'Turn it on' }));
  expect(await screen.findByText('AAAA-BBBB')).toBeInTheDocument();
  expect(seen.at(-1)?.body).toEqual({ code: '123456' });
  await userEvent.click(screen.getByRole('button', { name: 'I have kept them' }));
  expect(screen.queryByText('AAAA-BBBB')).toBeNull();
});

it('says how many recovery codes are left, and asks before it is taken away', async () => {
  const seen = answerRequests({ 'DELETE /api/account/second-factor': () => ({ status: 204 }) });
  renderInApp(<SecondFactor factor={{ isSet: true, recoveryCodesLeft: 1, isRequired: true }} />);
  expect(screen.getByText('1 recovery code is left.')).toBeInTheDocument();
  await userEvent.click(screen.getByRole('button', { name: 'Take it away' }));
  expect(seen).toEqual([]);
  const dialog = await screen.findByRole('alertdialog', { name: 'Take it away' });
  await userEvent.click([...dialog.querySelectorAll('button')].at(-1) as HTMLButtonElement);
  await waitFor(() => expect(seen.map(({ method }) => method)).toEqual(['DELETE']));
});

it('says that it is needed where money may not move without it', () => {
  renderInApp(<SecondFactor factor={{ ...none, isRequired: true }} />);
  expect(screen.getByText('Needed to move money')).toBeInTheDocument();
});
