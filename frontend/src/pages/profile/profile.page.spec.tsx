import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { changePasswordSchema, updateProfileSchema } from '@stayledger/shared/contracts/users';
import { screen, waitFor } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { chooseOption } from '../../testing/choose-option';
import { fakeApi, noContent, refusal, reply, type FakeRequest } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleSession } from '../../testing/samples';
// Loaded here, so that the time antd takes to load is not taken for time the page takes.
import '../../app/antd-scope';
import './profile.page';

afterEach(() => window.localStorage.clear());

/** A server that keeps the profile. */
function profile() {
  const session = sampleSession('insurer');
  return fakeApi(
    {
      'GET /auth/session': () => reply(sessionSchema, session),
      'PATCH /users/me': ({ body }: FakeRequest) => {
        const { name, preferences } = updateProfileSchema.parse(body);
        if (session.user) {
          session.user = {
            ...session.user,
            name: name ?? session.user.name,
            preferences: { ...session.user.preferences, ...preferences },
            version: session.user.version + 1,
          };
        }
        return noContent();
      },
      'POST /users/me/password': ({ body }: FakeRequest) =>
        changePasswordSchema.parse(body).currentPassword === 'the right one'
          ? noContent()
          : refusal(400, 'invalid-request', 'The password was not changed.', {
              fieldErrors: { currentPassword: ['This is not your password now.'] },
            }),
    },
    { 'PATCH /users/me': updateProfileSchema, 'POST /users/me/password': changePasswordSchema },
  );
}

describe('the profile', () => {
  it('keeps units, decimal mark and appearance, and applies them at once', async () => {
    const { requests } = profile();
    const { user } = renderApp('/profile');
    await screen.findByLabelText('Name');
    await chooseOption(user, 'Loads in', 'pound-force (lbf)');
    await user.click(screen.getByRole('radio', { name: 'Comma: 12,5' }));
    await user.click(screen.getByRole('radio', { name: 'Night watch' }));
    await user.click(screen.getByRole('button', { name: 'Save profile' }));
    expect(await screen.findByText('Saved.')).toBeTruthy();
    expect(requests.find(({ method }) => method === 'PATCH')?.body).toEqual({
      version: 1,
      name: 'Ailsa Renwick',
      preferences: { forceUnit: 'lbf', lengthUnit: 'm', theme: 'dark', decimalComma: true },
    });
    await waitFor(() => expect(document.documentElement.dataset.theme).toBe('dark'));
  });

  it('changes the password and forgets what was typed', async () => {
    profile();
    const { user } = renderApp('/profile');
    await user.type(await screen.findByLabelText('Password now'), 'the right one');
    await user.type(screen.getByLabelText('New password'), 'halyard and lanyard');
    await user.click(screen.getByRole('button', { name: 'Change password' }));
    expect(await screen.findByText(/^Changed\./)).toBeTruthy();
    expect(screen.getByLabelText<HTMLInputElement>('New password').value).toBe('');
  });

  it('refuses a short password before sending and a wrong one after', async () => {
    const { requests } = profile();
    const { user } = renderApp('/profile');
    await user.type(await screen.findByLabelText('Password now'), 'not it');
    await user.type(screen.getByLabelText('New password'), 'short');
    await user.click(screen.getByRole('button', { name: 'Change password' }));
    expect(await screen.findByText('Use at least 12 characters.')).toBeTruthy();
    expect(requests.some(({ method }) => method === 'POST')).toBe(false);
    await user.type(screen.getByLabelText('New password'), ' but now long enough');
    await user.click(screen.getByRole('button', { name: 'Change password' }));
    expect(await screen.findByText('This is not your password now.')).toBeTruthy();
  });
});
