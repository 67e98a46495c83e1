import { RIG_CSV_COLUMNS } from '@stayledger/shared/rig/csv/rig-csv';
import type { TestVessel } from '../testing/factories.js';
import { TestApp, type Agent } from '../testing/test-app.js';

let app: TestApp;
let agent: Agent;
let firmId: string;
let vessel: TestVessel;

beforeAll(async () => {
  app = await TestApp.create();
  const rigger = await app.make.member('rigger');
  firmId = rigger.firmId;
  agent = await app.signIn(rigger);
});
afterAll(() => app?.close());
beforeEach(async () => {
  vessel = await app.make.vessel({ firmId, buildYear: 2001 });
});

interface Position {
  id: string;
  label: string;
  part: { id: string; breakingLoadKn: number; fittedOn: string | null } | null;
}
const rigOf = async (vesselId: string): Promise<Position[]> =>
  (await agent.get(`/api/vessels/${vesselId}/rig`).expect(200)).body.items;
const send = (csv: string, apply: boolean) =>
  agent.post(`/api/vessels/${vessel.id}/rig/csv`).send({ csv, apply });

const GOOD = [
  'place,side,mast,construction,diameter_mm,fitted_on,certified_breaking_load_kn',
  'cap-shroud,port,main,strand-1x19-316,8,2024-04-01,',
  'cap-shroud,starboard,main,strand-1x19-316,8,2024-04-01,55',
  'triatic,centre,main,,,,',
].join('\n');

describe('the file of a rig', () => {
  it('says what it would do and does nothing until told to', async () => {
    const { body: dry } = await send(GOOD, false).expect(200);
    expect(dry.applied).toBe(false);
    expect(dry.lines.map(({ outcome }: { outcome: string }) => outcome)).toEqual([
      'adds-position-and-part',
      'adds-position-and-part',
      'adds-position',
    ]);
    expect(await rigOf(vessel.id)).toEqual([]);
    const { rows } = await app.database.admin.query('select 1 from audit_event where vessel_id = $1', [
      vessel.id,
    ]);
    expect(rows).toEqual([]);
    const { body: done } = await send(GOOD, true).expect(200);
    expect(done.applied).toBe(true);
    const rig = await rigOf(vessel.id);
    expect(rig.map(({ label }) => label)).toEqual([
      'Cap shroud, port',
      'Cap shroud, starboard',
      'Triatic stay',
    ]);
    expect(rig[0].part?.fittedOn).toBe('2024-04-01');
    expect(rig[1].part?.breakingLoadKn).toBe(55);
  });

  it('applies none of it while a line is wrong, and names the line', async () => {
    const text = `${GOOD}\nforestay,centre,main,no-such-wire,8,,\nbackstay,centre,main,strand-1x19-316,8,2031-01-01,`;
    const { body } = await send(text, true).expect(200);
    expect(body.applied).toBe(false);
    const wrong = body.lines.filter(({ errors }: { errors: string[] }) => errors.length > 0);
    expect(wrong.map(({ line }: { line: number }) => line)).toEqual([5, 6]);
    expect(wrong[1].errors[0]).toContain('still to come');
    expect(await rigOf(vessel.id)).toEqual([]);
  });

  it('leaves alone what is there, and fits into an empty place', async () => {
    await send('place,side\nforestay,centre', true).expect(200);
    const { body } = await send(
      'place,side,construction,diameter_mm\nforestay,centre,strand-1x19-316,8\nforestay,centre,strand-1x19-316,10',
      true,
    ).expect(200);
    expect(body.lines.map(({ outcome }: { outcome: string }) => outcome)).toEqual([
      'fits-part',
      'left-alone',
    ]);
  });

  it('comes out as it went in, with formulas made harmless', async () => {
    await send(GOOD, true).expect(200);
    const [first] = await rigOf(vessel.id);
    await agent
      .patch(`/api/parts/${first.part?.id}`)
      .send({ version: 1, notes: '=HYPERLINK("x")' })
      .expect(200);
    const { body } = await agent.get(`/api/vessels/${vessel.id}/rig/csv`).expect(200);
    expect(body.csv.split('\r\n')[0]).toBe(RIG_CSV_COLUMNS.join(','));
    expect(body.csv).toContain(`"'=HYPERLINK`);
    const other = await app.make.vessel({ firmId });
    await agent.post(`/api/vessels/${other.id}/rig/csv`).send({ csv: body.csv, apply: true }).expect(200);
    const { body: again } = await agent.get(`/api/vessels/${other.id}/rig/csv`).expect(200);
    expect(again.csv).toBe(body.csv);
  });

  it('is refused as a whole where it cannot be read', async () => {
    const { body } = await send('place,side\n"forestay,centre', false).expect(400);
    expect(body.fieldErrors.csv[0]).toContain('Line 2');
  });

  it('is not for the owner to import', async () => {
    const owner = await app.signIn(await app.make.userOn(vessel, 'owner'));
    await owner.get(`/api/vessels/${vessel.id}/rig/csv`).expect(200);
    await owner.post(`/api/vessels/${vessel.id}/rig/csv`).send({ csv: GOOD, apply: true }).expect(403);
  });
});

describe('a sister vessel', () => {
  it('starts with the rig of the other, without her days, papers and accounts', async () => {
    await send(GOOD, true).expect(200);
    const { body: drawn } = await agent.get(`/api/vessels/${vessel.id}/rig/geometry`).expect(200);
    await agent
      .put(`/api/vessels/${vessel.id}/rig/geometry`)
      .send({ version: null, geometry: { ...drawn.geometry, beamM: 3.21 } })
      .expect(200);
    const { body: sister } = await agent
      .post(`/api/vessels/${vessel.id}/sisters`)
      .send({ name: 'Sister', withParts: true })
      .expect(201);
    expect(sister).toMatchObject({ name: 'Sister', firmId, buildYear: 2001 });
    const rig = await rigOf(sister.id);
    expect(rig.map(({ label }) => label)).toEqual((await rigOf(vessel.id)).map(({ label }) => label));
    expect(rig[0].part).toMatchObject({ fittedOn: null });
    const { body: copied } = await agent.get(`/api/vessels/${sister.id}/rig/geometry`).expect(200);
    expect(copied).toMatchObject({ source: 'entered', geometry: { beamM: 3.21 } });
    const { body: bare } = await agent
      .post(`/api/vessels/${vessel.id}/sisters`)
      .send({ name: 'Bare', withParts: false })
      .expect(201);
    expect((await rigOf(bare.id)).every(({ part }) => part === null)).toBe(true);
  });
});
