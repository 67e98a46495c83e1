import { sessionSchema } from '@stayledger/shared/contracts/auth';
import {
  stateYardTermsSchema,
  yardTermsReplySchema,
  type YardTermsDto,
} from '@stayledger/shared/contracts/yard-terms';
import { STARTING_YARD_TERMS } from '@stayledger/shared/rerig-schedule/yard-terms';
import { screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, reply, type FakeRequest } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession } from '../../testing/samples';
import './yard-terms.page';

const start: YardTermsDto = {
  firmId: sampleId(2),
  firmName: 'Skerry Rigging',
  currency: 'EUR',
  terms: { ...STARTING_YARD_TERMS, seasons: [...STARTING_YARD_TERMS.seasons], closures: [] },
  version: null,
};

function terms() {
  return fakeApi(
    {
      'GET /auth/session': reply(sessionSchema, sampleSession('rigger')),
      'GET /yard-terms': reply(yardTermsReplySchema, start),
      'PUT /yard-terms': ({ body }: FakeRequest) => {
        const input = stateYardTermsSchema.parse(body);
        return reply(yardTermsReplySchema, { ...start, terms: input.terms, version: 1 });
      },
    },
    { 'PUT /yard-terms': stateYardTermsSchema },
  );
}

describe('the terms of a yard', () => {
  it('are written in whole units of the currency and kept in minor ones', async () => {
    const { requests } = terms();
    const { user } = renderApp('/yard-terms');
    expect(await screen.findByText(/has not stated its own terms yet/)).toBeTruthy();
    const [aloft] = screen.getAllByLabelText('Cost of the visit, EUR');
    await user.clear(aloft);
    await user.type(aloft, '210,50');
    await user.click(screen.getByRole('button', { name: 'Save the terms' }));
    expect(await screen.findByText(/What Skerry Rigging asks/)).toBeTruthy();
    const { body } = requests.find(({ method }) => method === 'PUT')!;
    const sent = stateYardTermsSchema.parse(body);
    expect(sent.version).toBeUndefined();
    expect(sent.terms).toEqual({
      ...start.terms,
      visits: { ...start.terms.visits, aloft: { costMinor: 21_050, hours: 2 } },
    });
  });

  it('refuse a visit that costs nothing at its field, and a closure that ends before it begins', async () => {
    const { requests } = terms();
    const { user } = renderApp('/yard-terms');
    const [aloft] = await screen.findAllByLabelText('Cost of the visit, EUR');
    await user.clear(aloft);
    await user.type(aloft, '0');
    await user.click(screen.getByRole('button', { name: 'Save the terms' }));
    expect(aloft.getAttribute('aria-invalid')).toBe('true');
    expect(screen.getByText('A visit must cost more than nothing.')).toBeTruthy();
    await user.type(aloft, '1');
    await user.click(screen.getByRole('button', { name: 'Add a closure' }));
    const [, , from] = screen.getAllByLabelText(/^From/);
    const [, , until] = screen.getAllByLabelText(/^Until/);
    await user.type(from, '2028-06-02');
    await user.type(until, '2028-06-01');
    await user.click(screen.getByRole('button', { name: 'Save the terms' }));
    expect((await screen.findByRole('alert')).textContent).toContain(
      'Closure 1: This ends before it begins.',
    );
    expect(requests.filter(({ method }) => method === 'PUT')).toEqual([]);
  });
});
