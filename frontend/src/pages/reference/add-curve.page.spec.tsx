import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { constructionListSchema } from '@stayledger/shared/contracts/constructions';
import {
  addCurveSchema,
  curveListSchema,
  listedCurveSchema,
  type ListedCurveDto,
} from '@stayledger/shared/contracts/curves';
import { cyclesToFailure } from '@stayledger/shared/fatigue/curves/cycles-to-failure';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { chooseOption } from '../../testing/choose-option';
import { fakeApi, reply } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession } from '../../testing/samples';
// Loaded here, so that the time antd takes to load is not taken for time the page takes.
import '../../app/antd-scope';
import './add-curve.page';

const own: ListedCurveDto = {
  id: 'own-sample',
  version: 1,
  name: 'Bench series 4',
  appliesTo: '1x19 strand with swaged eyes',
  measure: 'stress-metallic',
  level: 'mean',
  k: 0,
  sdLog10N: 0.2,
  environment: 'air',
  segments: [{ above: 0, m: 5, log10a: 15.8 }],
  meanLoad: { kind: 'none', reason: 'as tested.' },
  thickness: null,
  threadSize: null,
  cutOffRange: null,
  validity: { minRange: 60, maxRange: 240, note: 'Within the ranges tested.' },
  source: 'Invented for this spec',
  provenance: 'published',
  provenanceNote: 'Invented.',
  analogyNote: 'Invented.',
  selectable: true,
  firm: { id: sampleId(2), name: 'Skerry Rigging' },
};

function api() {
  return fakeApi(
    {
      'GET /auth/session': reply(sessionSchema, sampleSession('rigger')),
      'GET /curves': reply(curveListSchema, {
        items: [own, { ...own, id: 'shipped', name: 'Shipped', firm: null }],
      }),
      'GET /curves/:curveId': reply(listedCurveSchema, own),
      'GET /constructions': reply(constructionListSchema, { items: [] }),
      'POST /curves': reply(listedCurveSchema, own, 201),
    },
    { 'POST /curves': addCurveSchema },
  );
}

describe("a firm's own curves", () => {
  it('stand apart from the curves of the product', async () => {
    api();
    renderApp('/reference');
    const section = await screen.findByRole('region', { name: 'Added by your firm' });
    expect(within(section).getByRole('link', { name: 'Bench series 4' })).toBeTruthy();
    const shipped = await screen.findByRole('region', { name: 'Curves' });
    expect(within(shipped).queryByText('Bench series 4')).toBeNull();
    expect(within(shipped).getByText('Shipped')).toBeTruthy();
  });

  it('say on their page who added them, where they hold, and offer a correction', async () => {
    api();
    renderApp('/reference/curves/own-sample');
    expect(await screen.findByText(/Added by Skerry Rigging/)).toBeTruthy();
    expect(screen.getByRole('img', { name: /supports ranges from 60\.0.MPa to 240.MPa/ })).toBeTruthy();
    expect(screen.getByRole('link', { name: 'Correct this curve' })).toBeTruthy();
  });

  it('are written as a point and a slope and sent as segments', async () => {
    const { requests } = api();
    const { user, router } = renderApp('/reference/curves/new');
    const write = async (label: RegExp, text: string) => {
      await user.click(await screen.findByRole('textbox', { name: label }));
      await user.paste(text);
    };
    await write(/^Called/, 'Bench series 4');
    await write(/^What was tested/, '1x19 strand with swaged eyes');
    await write(/^Range at two million/, '80,5');
    await write(/^Slope m/, '5');
    await write(/^Standard deviations below/, '2');
    await write(/^Source/, 'Bench report 4');
    await chooseOption(user, /^How the figures came here/, 'Published, read in the source itself');
    await write(/^Read or made how/, 'Read from the report.');
    await write(/^How far from the part/, 'The same wire.');
    expect(await screen.findByRole('img', { name: /^The line as it will stand/ })).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Add the curve' }));
    await screen.findByRole('heading', { level: 1, name: 'Bench series 4' });
    expect(router.state.location.pathname).toBe('/reference/curves/own-sample');
    const sent = addCurveSchema.parse(requests.find(({ method }) => method === 'POST')?.body);
    expect(sent.k).toBe(2);
    expect(cyclesToFailure(sent, 80.5) / 2e6).toBeCloseTo(1, 9);
    // Half the range, slope 5: 32 times the cycles.
    expect(cyclesToFailure(sent, 40.25) / (32 * 2e6)).toBeCloseTo(1, 9);
  }, 60_000);
});
