import { demoSignInsSchema, sessionSchema, signInSchema } from '@stayledger/shared/contracts/auth';
import { vesselPageSchema } from '@stayledger/shared/contracts/vessels';
import type { Role } from '@stayledger/shared/permissions/permissions';
import { screen, waitFor, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, refusal, reply } from '../testing/fake-api';
import { renderApp } from '../testing/render-app';
import { sampleSession, signedOut } from '../testing/samples';
import { landingPath } from './landing-redirect';

const noDemo = reply(demoSignInsSchema, { items: [] });
const noVessels = reply(vesselPageSchema, { items: [], nextCursor: null });

describe('signed-out people', () => {
  it('see the sign-in page, come back to where they wanted to go, and nowhere else', async () => {
    let session = signedOut;
    const { requests } = fakeApi(
      {
        'GET /auth/session': () => reply(sessionSchema, session),
        'GET /auth/demo-sign-ins': noDemo,
        'GET /vessels': noVessels,
        'POST /auth/sign-in': () => reply(sessionSchema, (session = sampleSession('rigger'))),
      },
      { 'POST /auth/sign-in': signInSchema },
    );
    const { user, router } = renderApp('/fleet?filter=overdue');
    await user.type(await screen.findByLabelText('E-mail address'), 'Ailsa@Example.org');
    await user.type(screen.getByLabelText('Password'), 'a long enough one{Enter}');
    await screen.findByRole('heading', { name: 'Fleet' });
    expect(router.state.location).toMatchObject({ pathname: '/fleet', search: '?filter=overdue' });
    const sent = requests.find(({ path }) => path === '/auth/sign-in');
    expect(sent?.body).toEqual({ email: 'ailsa@example.org', password: 'a long enough one' });
  });

  it('are not led to another site by the address they came with', async () => {
    fakeApi({
      'GET /auth/session': reply(sessionSchema, sampleSession('insurer')),
      'GET /auth/demo-sign-ins': noDemo,
    });
    const { router } = renderApp('/sign-in?from=//elsewhere.example/');
    await waitFor(() => expect(router.state.location.pathname).toBe('/portfolio'));
  });

  it('read why they were refused, and keep what they typed', async () => {
    fakeApi({
      'GET /auth/session': reply(sessionSchema, signedOut),
      'GET /auth/demo-sign-ins': noDemo,
      'POST /auth/sign-in': refusal(401, 'wrong-credentials', 'The address or the password is not right.'),
    });
    const { user } = renderApp('/sign-in');
    await user.type(await screen.findByLabelText('E-mail address'), 'ailsa@example.org');
    await user.type(screen.getByLabelText('Password'), 'wrong{Enter}');
    expect(await screen.findByRole('alert')).toHaveProperty(
      'textContent',
      'The address or the password is not right.',
    );
    expect(screen.getByLabelText<HTMLInputElement>('E-mail address').value).toBe('ailsa@example.org');
  });

  it('are told which field is empty, with the cursor in it, before anything is sent', async () => {
    const { requests } = fakeApi({
      'GET /auth/session': reply(sessionSchema, signedOut),
      'GET /auth/demo-sign-ins': noDemo,
    });
    const { user } = renderApp('/sign-in');
    await user.type(await screen.findByLabelText('E-mail address'), 'ailsa@example.org{Enter}');
    const password = screen.getByLabelText('Password');
    expect(password).toBe(document.activeElement);
    expect(password.getAttribute('aria-invalid')).toBe('true');
    expect(requests.every(({ method }) => method === 'GET')).toBe(true);
  });

  it('may look around where the service offers it', async () => {
    let session = signedOut;
    const { requests } = fakeApi({
      'GET /auth/session': () => reply(sessionSchema, session),
      'GET /auth/demo-sign-ins': reply(demoSignInsSchema, {
        items: [{ email: 'piet@example.org', password: 'for show only', role: 'insurer', name: 'Piet Hals' }],
      }),
      'POST /auth/sign-in': () => reply(sessionSchema, (session = sampleSession('insurer'))),
    });
    const { user } = renderApp('/sign-in');
    await user.click(await screen.findByRole('button', { name: 'insurer' }));
    await screen.findByRole('heading', { name: 'Portfolio' });
    expect(requests.find(({ method }) => method === 'POST')?.body).toEqual({
      email: 'piet@example.org',
      password: 'for show only',
    });
  });
});

describe('a session that ends', () => {
  it('leads to the sign-in page from the page that noticed, and remembers the way back', async () => {
    let session = sampleSession('rigger');
    fakeApi({
      'GET /auth/session': () => reply(sessionSchema, session),
      'GET /auth/demo-sign-ins': noDemo,
      'GET /vessels': () => {
        session = signedOut;
        return refusal(401, 'signed-out', 'Sign in again.');
      },
    });
    const { router } = renderApp('/fleet?sort=name');
    await screen.findByRole('heading', { name: 'Sign in' });
    expect(router.state.location.search).toBe('?from=%2Ffleet%3Fsort%3Dname');
  });
});

describe('the navigation', () => {
  it.each<[Role, string[]]>([
    ['surveyor', ['Fleet', 'Reference data']],
    ['rigger', ['Fleet', 'Reference data']],
    ['owner', ['My vessel', 'Reference data']],
    ['insurer', ['Portfolio', 'Reference data']],
    ['administrator', ['Administration']],
  ])('offers a %s what that role came for, help, and nothing else', async (role, labels) => {
    fakeApi({ 'GET /auth/session': reply(sessionSchema, sampleSession(role)) });
    renderApp('/nowhere');
    const navigation = await screen.findByRole('navigation', { name: 'Main' });
    expect(
      within(navigation)
        .getAllByRole('link')
        .map((link) => link.textContent),
    ).toEqual([...labels, 'Help']);
    expect(screen.getByRole('heading', { name: 'Not found' })).toBeTruthy();
  });

  it.each<[Role[], string]>([
    [['surveyor'], '/fleet'],
    [['rigger'], '/fleet'],
    [['owner'], '/my-vessel'],
    [['insurer'], '/portfolio'],
    [['administrator'], '/administration'],
    [['owner', 'rigger'], '/fleet'],
    [[], '/profile'],
  ])('lands %j on %s', (roles, path) => {
    expect(landingPath({ hasRole: (...asked) => asked.some((role) => roles.includes(role)) })).toBe(path);
  });

  it('opens and closes the menu by its button and says so', async () => {
    fakeApi({ 'GET /auth/session': reply(sessionSchema, sampleSession('rigger')) });
    const { user } = renderApp('/nowhere');
    const button = await screen.findByRole('button', { name: 'Menu' });
    expect(button.getAttribute('aria-expanded')).toBe('false');
    await user.click(button);
    expect(button.getAttribute('aria-expanded')).toBe('true');
    await user.click(button);
    expect(button.getAttribute('aria-expanded')).toBe('false');
  });
});
