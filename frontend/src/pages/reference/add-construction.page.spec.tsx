import { preferencesSchema, sessionSchema } from '@stayledger/shared/contracts/auth';
import {
  addConstructionSchema,
  constructionListSchema,
  listedConstructionSchema,
  type ListedConstructionDto,
} from '@stayledger/shared/contracts/constructions';
import { curveListSchema } from '@stayledger/shared/contracts/curves';
import { screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { chooseOption } from '../../testing/choose-option';
import { fakeApi, reply } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleSession } from '../../testing/samples';
// Loaded here, so that the time antd takes to load is not taken for time the page takes.
import '../../app/antd-scope';
import './add-construction.page';

const strand: ListedConstructionDto = {
  id: 'strand-sample',
  version: 1,
  name: 'Sample strand',
  kind: '1x19',
  kindOfWire: 'strand',
  materialId: 'stainless-316-wire',
  fillFactor: 0.76,
  youngGpa: 130,
  replacementRuleId: 'stainless-wire',
  sizes: [
    {
      designation: '10 mm',
      diameterMm: 10,
      metallicAreaMm2: 59.7,
      breakingLoads: [{ gradeMpa: null, breakingLoadKn: 71 }],
      massKgPerM: 0.49,
      axialStiffnessKn: 7761,
    },
  ],
  source: 'Invented for this spec',
  provenance: 'estimate',
  provenanceNote: 'Invented.',
  firm: null,
};

describe("a firm's own construction", () => {
  it('takes lay, material and rule from what it is made like, and loads in the unit of the person', async () => {
    const session = sampleSession('rigger');
    if (session.user) session.user.preferences = preferencesSchema.parse({ forceUnit: 'tf' });
    const { requests } = fakeApi(
      {
        'GET /auth/session': reply(sessionSchema, session),
        'GET /curves': reply(curveListSchema, { items: [] }),
        'GET /constructions': reply(constructionListSchema, { items: [strand] }),
        'POST /constructions': reply(listedConstructionSchema, strand, 201),
      },
      { 'POST /constructions': addConstructionSchema },
    );
    const { user } = renderApp('/reference/constructions/new');
    const write = async (label: RegExp, text: string) => {
      await user.click(await screen.findByRole('textbox', { name: label }));
      await user.paste(text);
    };
    await write(/^Called/, 'By certificate');
    await chooseOption(user, /^Made like/, 'Sample strand');
    expect(screen.getByRole('textbox', { name: /^Modulus/ })).toHaveProperty('value', '130');
    await write(/^Diameter/, '12');
    await write(/^Metallic area/, '86');
    await write(/^Breaking load/, '10');
    await write(/^Mass/, '0,7');
    await write(/^Source/, 'Certificate 7');
    await chooseOption(user, /^How the figures came here/, 'Published, read in the source itself');
    await write(/^Read or made how/, 'Read from the certificate.');
    await user.click(screen.getByRole('button', { name: 'Add the construction' }));
    await screen.findByRole('heading', { level: 1, name: 'Reference data' });
    const sent = addConstructionSchema.parse(requests.find(({ method }) => method === 'POST')?.body);
    expect(sent).toMatchObject({
      kind: '1x19',
      materialId: 'stainless-316-wire',
      replacementRuleId: 'stainless-wire',
    });
    // Ten tonnes-force are 98.0665 kN, by the standard acceleration of gravity (ISO 80000-3).
    expect(sent.sizes[0].breakingLoadKn).toBeCloseTo(98.0665, 6);
    expect(sent.sizes[0].massKgPerM).toBe(0.7);
  }, 60_000);
});
