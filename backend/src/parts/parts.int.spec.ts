import { TestApp, type Agent } from '../testing/test-app.js';
import type { TestVessel } from '../testing/factories.js';

let app: TestApp;
let agent: Agent;
let vessel: TestVessel;

beforeAll(async () => {
  app = await TestApp.create();
  const rigger = await app.make.member('rigger');
  vessel = await app.make.vessel({ firmId: rigger.firmId, buildYear: 2012 });
  agent = await app.signIn(rigger);
});
afterAll(() => app?.close());

/** 8 mm of 1x19 stainless: the table has two grades. */
const WIRE = { constructionId: 'strand-1x19-316', diameterMm: 8 };

async function emptyPosition(kind = 'cap-shroud'): Promise<string> {
  return (await app.make.position(vessel, { kind })).id;
}

async function fitPart(body: object = WIRE, positionId?: string) {
  const reply = await agent.post(`/api/positions/${positionId ?? (await emptyPosition())}/parts`).send(body);
  return {
    status: reply.status,
    part: reply.body,
    errors: reply.body.fieldErrors as Record<string, string[]>,
  };
}

interface Size {
  diameterMm: number;
  metallicAreaMm2: number;
  breakingLoads: { breakingLoadKn: number }[];
}

async function tableSize(constructionId: string, diameterMm: number): Promise<Size> {
  const { body } = await agent.get('/api/constructions').expect(200);
  const construction = body.items.find((item: { id: string }) => item.id === constructionId);
  return construction.sizes.find((size: Size) => size.diameterMm === diameterMm);
}

describe('fitting a part', () => {
  it('takes the lower grade of the table without a certificate, and says so', async () => {
    const { status, part } = await fitPart();
    expect(status).toBe(201);
    const size = await tableSize('strand-1x19-316', 8);
    const lowest = Math.min(...size.breakingLoads.map(({ breakingLoadKn }) => breakingLoadKn));
    expect(size.breakingLoads.length).toBeGreaterThan(1);
    expect(part).toMatchObject({
      breakingLoadKn: lowest,
      breakingLoadSource: 'table-lower-grade',
      breakingLoadFromCertificate: false,
      metallicAreaMm2: size.metallicAreaMm2,
      kindOfWire: 'strand',
      upperTerminal: 'unknown',
      removedOn: null,
      version: 1,
    });
  });

  it('lays out the details with curve, factor and words', async () => {
    const { part } = await fitPart({
      ...WIRE,
      upperTerminal: 'swaged',
      lowerTerminal: 'swaged',
      threadSize: 'M12',
      pinDiameterMm: 12,
    });
    const keys = part.details.map((detail: { key: string }) => detail.key);
    expect(keys).toEqual(
      expect.arrayContaining(['free-length', 'upper-terminal', 'lower-terminal', 'turnbuckle-thread', 'pin']),
    );
    const wire = part.details.find((detail: { key: string }) => detail.key === 'free-length');
    // A load of 1 kN on A mm2 is 1000 / A MPa.
    expect(wire.factor).toBeCloseTo(1000 / part.metallicAreaMm2, 9);
    expect(wire.curveId).toEqual(expect.any(String));
    expect(wire.explanation).not.toBe('');
  });

  it('knows how strong the assembly is, and which element nobody knows', async () => {
    const { part } = await fitPart({ ...WIRE, upperTerminal: 'swaged', lowerTerminal: 'poured-socket' });
    // Reference data: a swage holds 0.9 of the wire, a poured socket all of it.
    expect(part.assembly.breakingLoadKn).toBeCloseTo(0.9 * part.breakingLoadKn, 9);
    expect(part.assembly.weakestElement).toBe('upper terminal');
    expect(part.assembly.unknownElements).toEqual(expect.arrayContaining(['turnbuckle', 'chainplate']));
  });

  it('names the weakest of its hardware, before and after it is stored', async () => {
    const hardware = {
      turnbuckle: { there: true, breakingLoadKn: 40 },
      toggle: { there: false, breakingLoadKn: null },
      pin: { there: true, breakingLoadKn: 33.5 },
      chainplate: { there: true, breakingLoadKn: null },
      upperArticulation: 'both-planes',
      lowerArticulation: null,
    };
    const described = { ...WIRE, upperTerminal: 'swaged', lowerTerminal: 'swaged', hardware };
    const expected = { breakingLoadKn: 33.5, weakestElement: 'pin', unknownElements: ['chainplate'] };
    const { body } = await agent
      .post('/api/part-strengths')
      .send({ ...described, breakingLoadKn: null })
      .expect(200);
    expect(body).toEqual(expected);
    const { part } = await fitPart(described);
    expect(part.hardware).toEqual(hardware);
    expect(part.assembly).toEqual(expected);
    const upper = part.details.find((detail: { key: string }) => detail.key === 'upper-terminal');
    const lower = part.details.find((detail: { key: string }) => detail.key === 'lower-terminal');
    expect(upper.explanation).toContain('both planes');
    expect(lower.estimates.join(' ')).toContain('0.25 degree');
  });

  it('believes a certificate over the table', async () => {
    const { part } = await fitPart({
      ...WIRE,
      breakingLoadKn: 61.5,
      breakingLoadFromCertificate: true,
      certificate: 'C 12',
    });
    expect(part).toMatchObject({
      breakingLoadKn: 61.5,
      breakingLoadSource: 'certificate',
      certificate: 'C 12',
    });
    const { status, errors } = await fitPart({ ...WIRE, breakingLoadKn: 61.5 });
    expect([status, Object.keys(errors)]).toEqual([400, ['breakingLoadKn']]);
  });

  it('takes a diameter the table lacks only with a certificate', async () => {
    const odd = { ...WIRE, diameterMm: 8.7 };
    expect((await fitPart(odd)).errors).toHaveProperty('breakingLoadKn');
    const { status, part } = await fitPart({ ...odd, breakingLoadKn: 70, breakingLoadFromCertificate: true });
    expect(status).toBe(201);
    // Fill factor of 1x19 strand 0.76 (EN 1993-1-11 Table 2.2, secondary): 0.76 * pi / 4 * 8.7^2 = 45.18 mm2.
    expect(part.metallicAreaMm2).toBeCloseTo(45.18, 1);
  });

  it('refuses what cannot be', async () => {
    expect((await fitPart({ ...WIRE, constructionId: 'spaghetti' })).errors).toHaveProperty('constructionId');
    expect((await fitPart({ ...WIRE, upperTerminal: 'cold-head' })).errors).toHaveProperty('upperTerminal');
    expect((await fitPart({ ...WIRE, fittedOn: '2027-07-02' })).errors).toHaveProperty('fittedOn');
    expect((await fitPart({ ...WIRE, fittedOn: '2027-02-30' })).errors).toHaveProperty('fittedOn');
    expect((await fitPart({ ...WIRE, diameterMm: -8 })).errors).toHaveProperty('diameterMm');
  });

  it('has room for one part in a place, also for two people at once', async () => {
    const positionId = await emptyPosition();
    const replies = await Promise.all([fitPart(WIRE, positionId), fitPart(WIRE, positionId)]);
    expect(replies.map(({ status }) => status).sort()).toEqual([201, 409]);
    const { rows } = await app.database.admin.query(
      'select count(*)::int as n from fitted_part where position_id = $1',
      [positionId],
    );
    expect(rows[0].n).toBe(1);
  });

  it('gives a date by the calendar from the day of fitting', async () => {
    const { part } = await fitPart({ ...WIRE, fittedOn: '2020-05-01' });
    // Stainless wire, private use: ten years (reference data, common practice).
    expect(part.standing).toMatchObject({
      assessment: 'not-assessed',
      calendarReplaceByOn: '2030-05-01',
      replaceByOn: '2030-05-01',
      governingRule: 'calendar',
      due: 'in-date',
    });
  });
});

describe('changing a part', () => {
  it('lets the table speak again when the size changes', async () => {
    const { part } = await fitPart();
    const { body } = await agent
      .patch(`/api/parts/${part.id}`)
      .send({ version: 1, diameterMm: 10 })
      .expect(200);
    const size = await tableSize('strand-1x19-316', 10);
    expect(body).toMatchObject({
      diameterMm: 10,
      metallicAreaMm2: size.metallicAreaMm2,
      breakingLoadKn: Math.min(...size.breakingLoads.map(({ breakingLoadKn }) => breakingLoadKn)),
      version: 2,
    });
    const wire = body.details.find((detail: { key: string }) => detail.key === 'free-length');
    expect(wire.factor).toBeCloseTo(1000 / size.metallicAreaMm2, 9);
  });

  it('keeps a certificate through other changes', async () => {
    const { part } = await fitPart({ ...WIRE, breakingLoadKn: 61.5, breakingLoadFromCertificate: true });
    const { body } = await agent
      .patch(`/api/parts/${part.id}`)
      .send({ version: 1, notes: 'Looked at' })
      .expect(200);
    expect(body).toMatchObject({
      notes: 'Looked at',
      breakingLoadKn: 61.5,
      breakingLoadSource: 'certificate',
    });
    const { body: back } = await agent
      .patch(`/api/parts/${part.id}`)
      .send({ version: 2, breakingLoadKn: null, breakingLoadFromCertificate: false })
      .expect(200);
    expect(back.breakingLoadSource).toBe('table-lower-grade');
  });

  it('answers 409 with the stored state', async () => {
    const { part } = await fitPart();
    await agent.patch(`/api/parts/${part.id}`).send({ version: 1, notes: 'First' }).expect(200);
    const { body } = await agent
      .patch(`/api/parts/${part.id}`)
      .send({ version: 1, notes: 'Second' })
      .expect(409);
    expect(body).toMatchObject({ code: 'version-conflict', current: { notes: 'First', version: 2 } });
  });

  it('changes nothing when a later step fails', async () => {
    const { part } = await fitPart();
    await agent
      .patch(`/api/parts/${part.id}`)
      .send({ version: 1, notes: 'Kept', diameterMm: 8.7 })
      .expect(400);
    const { body } = await agent.get(`/api/parts/${part.id}`).expect(200);
    expect(body).toMatchObject({ notes: '', diameterMm: 8, version: 1 });
  });
});

describe('removing a part', () => {
  it('frees the place for the next one, whose account starts anew', async () => {
    const positionId = await emptyPosition();
    const { part } = await fitPart({ ...WIRE, fittedOn: '2020-05-01' }, positionId);
    const remove = (removedOn: string) =>
      agent
        .post(`/api/parts/${part.id}/remove`)
        .send({ version: 1, removedOn, reason: 'Broken wires at the swage' });
    expect((await remove('2019-01-01').expect(400)).body.fieldErrors).toHaveProperty('removedOn');
    expect((await remove('2030-01-01').expect(400)).body.fieldErrors).toHaveProperty('removedOn');
    const { body } = await remove('2027-06-01').expect(200);
    expect(body).toMatchObject({
      removedOn: '2027-06-01',
      removedReason: 'Broken wires at the swage',
      version: 2,
    });

    expect((await fitPart({ ...WIRE, fittedOn: '2027-05-01' }, positionId)).errors).toHaveProperty(
      'fittedOn',
    );
    const next = await fitPart({ ...WIRE, fittedOn: '2027-06-01' }, positionId);
    expect(next.status).toBe(201);
    expect(next.part.id).not.toBe(part.id);
    await agent.patch(`/api/parts/${part.id}`).send({ version: 2, notes: 'Too late' }).expect(409);
    await agent
      .post(`/api/parts/${part.id}/remove`)
      .send({ version: 2, removedOn: '2027-06-02', reason: 'Again' })
      .expect(409);
  });

  it('is noted, like every deed', async () => {
    const { part } = await fitPart();
    await agent.patch(`/api/parts/${part.id}`).send({ version: 1, notes: 'x' }).expect(200);
    await agent
      .post(`/api/parts/${part.id}/remove`)
      .send({ version: 2, removedOn: '2027-06-30', reason: 'Re-rig' })
      .expect(200);
    const { rows } = await app.database.admin.query(
      'select action, vessel_id from audit_event where subject_id = $1 order by id',
      [part.id],
    );
    expect(rows.map(({ action }) => action)).toEqual(['part.fitted', 'part.updated', 'part.removed']);
    expect(new Set(rows.map(({ vessel_id }) => vessel_id))).toEqual(new Set([vessel.id]));
  });
});
