import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { ROLES, type Role } from '@stayledger/shared/permissions/permissions';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { GLOSSARY } from '../../components/glossary/glossary';
import { fakeApi, reply } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleSession } from '../../testing/samples';

describe('help', () => {
  it.each(ROLES)('opens the guide of a %s and offers the others folded away', async (role: Role) => {
    fakeApi({ 'GET /auth/session': reply(sessionSchema, sampleSession(role)) });
    renderApp('/help');
    const guide = await screen.findByRole('region', { name: new RegExp(`^For ${role}s$`) });
    expect(within(guide).getAllByRole('listitem').length).toBeGreaterThan(2);
    const others = screen.getByRole('region', { name: 'What others see' });
    // Links of other roles lead where this reader may not go.
    expect(within(others).queryAllByRole('link')).toEqual([]);
    expect(within(others).getAllByText(/^For /)).toHaveLength(ROLES.length - 1);
  });

  it('explains every word of the glossary', async () => {
    fakeApi({ 'GET /auth/session': reply(sessionSchema, sampleSession('owner')) });
    renderApp('/help');
    const words = await screen.findByRole('region', { name: 'Words' });
    expect(
      within(words)
        .getAllByRole('term')
        .map((term) => term.textContent),
    ).toEqual(Object.keys(GLOSSARY).sort((a, b) => a.localeCompare(b)));
  });
});
