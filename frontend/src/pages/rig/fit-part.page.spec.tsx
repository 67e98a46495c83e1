import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { constructionListSchema, type ConstructionDto } from '@stayledger/shared/contracts/constructions';
import { assemblySchema, fitPartSchema } from '@stayledger/shared/contracts/parts';
import { rigSchema } from '@stayledger/shared/contracts/rig';
import { screen, waitFor } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { chooseOption } from '../../testing/choose-option';
import { fakeApi, refusal, reply } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleId, samplePosition, sampleSession } from '../../testing/samples';
// Loaded here, so that the time antd takes to load is not taken for time the page takes.
import '../../app/antd-scope';
import './fit-part.page';

const PATH = `/vessels/${sampleId(10)}/positions/${sampleId(20)}/fit`;

const strand: ConstructionDto = {
  id: 'strand-sample',
  version: 1,
  name: 'Sample strand',
  kind: '1x19',
  kindOfWire: 'strand',
  materialId: 'stainless',
  fillFactor: 0.76,
  youngGpa: 110,
  replacementRuleId: null,
  sizes: [
    {
      designation: '10 mm',
      diameterMm: 10,
      metallicAreaMm2: 59.7,
      breakingLoads: [
        { gradeMpa: 1570, breakingLoadKn: 82.5 },
        { gradeMpa: 1370, breakingLoadKn: 72 },
      ],
      massKgPerM: 0.49,
      axialStiffnessKn: 6566,
    },
  ],
  source: 'Invented for this spec',
  provenance: 'estimate',
  provenanceNote: 'Invented for this spec.',
};
const rod: ConstructionDto = {
  ...strand,
  id: 'rod-sample',
  name: 'Sample rod',
  kind: 'rod',
  kindOfWire: 'rod',
  sizes: [
    {
      ...strand.sizes[0],
      designation: '-10',
      diameterMm: 8.38,
      breakingLoads: [{ gradeMpa: null, breakingLoadKn: 55 }],
    },
  ],
};

function fitting(position = samplePosition({ part: null })) {
  return fakeApi(
    {
      'GET /auth/session': reply(sessionSchema, sampleSession('rigger')),
      'GET /vessels/:vesselId/rig': reply(rigSchema, { items: [position] }),
      'GET /constructions': reply(constructionListSchema, {
        items: [strand, rod].map((one) => ({ ...one, firm: null })),
      }),
      'POST /part-strengths': reply(assemblySchema, {
        breakingLoadKn: 64.8,
        weakestElement: 'upper terminal',
        unknownElements: ['lower terminal'],
      }),
      'POST /positions/:positionId/parts': refusal(503, 'unavailable', 'Not now.'),
    },
    { 'POST /positions/:positionId/parts': fitPartSchema },
  );
}

describe('fitting a part', () => {
  it('shows the table figure with its flag and leaves the choice of it to the server', async () => {
    const { requests } = fitting();
    const { user } = renderApp(PATH);
    await screen.findByLabelText('Construction');
    await chooseOption(user, 'Construction', 'Sample strand');
    await chooseOption(user, 'Diameter', '10 mm');
    // The lower of two grades counts, whatever their order in the table.
    expect(
      await screen.findByText(/Table: 72\.0.kN for the lower wire grade, 82\.5.kN for the higher/),
    ).toBeTruthy();
    await chooseOption(user, 'Upper terminal', 'Swaged terminal');
    await user.type(screen.getByLabelText(/Clevis pin diameter/), '12,7');
    await user.click(screen.getByRole('button', { name: 'Fit this part' }));
    await waitFor(() => expect(requests.at(-1)?.method).toBe('POST'));
    expect(requests.at(-1)?.path).toBe(`/positions/${sampleId(20)}/parts`);
    expect(requests.at(-1)?.body).toEqual({
      constructionId: 'strand-sample',
      diameterMm: 10,
      breakingLoadKn: null,
      breakingLoadFromCertificate: false,
      lengthM: null,
      upperTerminal: 'swaged',
      lowerTerminal: 'unknown',
      threadSize: null,
      pinDiameterMm: 12.7,
      hardware: null,
      alsoOtherSide: false,
      batch: '',
      certificate: '',
      fittedOn: null,
      notes: '',
    });
  });

  it("takes a certificate's figure in place of the table's", async () => {
    const { requests } = fitting();
    const { user } = renderApp(PATH);
    await screen.findByLabelText('Construction');
    await chooseOption(user, 'Construction', 'Sample strand');
    await chooseOption(user, 'Diameter', '10 mm');
    await user.click(screen.getByRole('radio', { name: 'From a certificate' }));
    await user.click(screen.getByRole('button', { name: 'Fit this part' }));
    expect(await screen.findByText("Write the figure of the certificate, or take the table's.")).toBeTruthy();
    await user.type(screen.getByLabelText('Certified breaking load'), '79.4');
    await user.type(screen.getByLabelText(/^Certificate/), 'Mill 4471');
    await user.click(screen.getByRole('button', { name: 'Fit this part' }));
    await waitFor(() => expect(requests.at(-1)?.method).toBe('POST'));
    expect(requests.at(-1)?.body).toMatchObject({
      breakingLoadKn: 79.4,
      breakingLoadFromCertificate: true,
      certificate: 'Mill 4471',
    });
  });

  it('drops a diameter and an end that another construction does not have', async () => {
    fitting();
    const { user } = renderApp(PATH);
    await screen.findByLabelText('Construction');
    await chooseOption(user, 'Construction', 'Sample strand');
    await chooseOption(user, 'Diameter', '10 mm');
    await chooseOption(user, 'Upper terminal', 'Swaged terminal');
    await chooseOption(user, 'Construction', 'Sample rod');
    await user.click(screen.getByRole('button', { name: 'Fit this part' }));
    expect(await screen.findByText('Choose the diameter.')).toBeTruthy();
    await user.click(screen.getByRole('combobox', { name: 'Upper terminal' }));
    expect((await screen.findAllByTitle('Cold-formed head')).length).toBeGreaterThan(0);
    expect(screen.queryByRole('option', { name: 'Swaged terminal' })).toBeNull();
  });

  it('does not fit a part where one is fitted', async () => {
    fitting(samplePosition());
    renderApp(PATH);
    const link = await screen.findByRole('link', { name: 'Take the old part off' });
    expect(link.getAttribute('href')).toBe(`/parts/${sampleId(30)}/remove`);
    expect(screen.queryByLabelText('Construction')).toBeNull();
  });
});
