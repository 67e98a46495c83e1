import { saveGeometrySchema, type DrawnRigDto, type PositionDto } from '@stayledger/shared/contracts/rig';
import type { MastGeometry, PositionGeometry, RigGeometry, RigPoint } from '@stayledger/shared/rig/geometry';
import Form from 'antd/es/form';
import { useState } from 'react';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { FieldPair } from '../../components/forms/field-pair';
import { ChoiceField, figureOf, figureText, NumberField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { PlainButton } from '../../components/plain-button/plain-button';
import { useFormat } from '../../lib/formatting/use-format';
import { usePreferences } from '../../lib/session';
import { saveGeometry } from './geometry.queries';
import styles from './rig.module.css';

interface PointValues {
  aft: string;
  starboard: string;
  up: string;
}
interface SpreaderValues {
  height: string;
  length: string;
  sweep: string;
}
interface MastValues {
  footAft: string;
  footUp: string;
  height: string;
  hounds: string;
  rake: string;
  spreaders: SpreaderValues[];
}
interface GeometryValues {
  deckLength: string;
  beam: string;
  sprit: { length: string; up: string };
  masts: MastValues[];
  positionId?: string;
  lower: PointValues;
  upper: PointValues;
}

interface GeometryFormProps {
  vesselId: string;
  drawn: DrawnRigDto;
  positions: readonly PositionDto[];
  cancelTo: string;
  onDone: () => void | Promise<void>;
  onReload: () => void;
}

const MOST_SPREADERS = 5;
const NO_POINT: PointValues = { aft: '', starboard: '', up: '' };

/** Hull, masts and spreaders in figures, and the run of one stay at a time. */
export function GeometryForm({ vesselId, drawn, positions, cancelTo, onDone, onReload }: GeometryFormProps) {
  const format = useFormat();
  const { decimalComma } = usePreferences();
  const { geometry } = drawn;
  const text = (m: number) => figureText(Math.round(format.lengthFromM(m) * 100) / 100, decimalComma);
  const metres = (typed: string | undefined) => {
    const figure = figureOf(typed);
    return figure === null ? Number.NaN : format.lengthToM(figure);
  };
  const pointText = ({ aftM, starboardM, upM }: RigPoint): PointValues => ({
    aft: text(aftM),
    starboard: text(starboardM),
    up: text(upM),
  });
  const pointOf = ({ aft, starboard, up }: PointValues): RigPoint => ({
    aftM: metres(aft),
    starboardM: metres(starboard),
    upM: metres(up),
  });
  const runOf = (positionId: string | undefined): PositionGeometry | null =>
    drawn.positions.find((place) => place.positionId === positionId)?.geometry ?? null;
  const [pairs, setPairs] = useState(geometry.masts.map(({ spreaders }) => spreaders.length));

  const contractForm = useContractForm({
    contract: saveGeometrySchema,
    toInput: (values: GeometryValues) => {
      const run = runOf(values.positionId);
      return {
        version: drawn.version,
        geometry: {
          deckLengthM: metres(values.deckLength),
          beamM: metres(values.beam),
          bowspritTip:
            values.sprit.length.trim() === ''
              ? null
              : { aftM: -metres(values.sprit.length), starboardM: 0, upM: metres(values.sprit.up || '0') },
          masts: geometry.masts.map((mast, index) => mastOf(mast, values.masts[index], pairs[index], metres)),
        },
        positions:
          values.positionId && run
            ? [
                {
                  positionId: values.positionId,
                  geometry: { lower: pointOf(values.lower), via: run.via, upper: pointOf(values.upper) },
                },
              ]
            : [],
      };
    },
    send: (input) => saveGeometry(vesselId, input),
    onDone,
  });
  const { form } = contractForm;
  const positionId = Form.useWatch('positionId', form);
  const drawable = positions.filter(({ id }) => runOf(id) !== null);

  return (
    <ContractFormSheet<GeometryValues>
      name="geometry"
      contractForm={contractForm}
      initialValues={initialValues(geometry, text, (figure) => figureText(figure, decimalComma))}
      submitLabel="Save geometry"
      cancelTo={cancelTo}
      onReload={onReload}
    >
      <p className="soft">
        Distances aft are from the stem head, heights from the deck there. To port counts negative.
      </p>
      <FieldPair>
        <NumberField name="deckLength" label="Length on deck" unit={format.lengthUnit} required="Write it." />
        <NumberField name="beam" label="Beam" unit={format.lengthUnit} required="Write it." />
      </FieldPair>
      <FieldPair>
        <NumberField
          name={['sprit', 'length']}
          label="Bowsprit, outside the stem"
          unit={format.lengthUnit}
          hint="Empty: none."
        />
        <NumberField name={['sprit', 'up']} label="Height of its tip" unit={format.lengthUnit} />
      </FieldPair>
      {geometry.masts.map((mast, index) => (
        <fieldset key={mast.key} className={styles.mast}>
          <legend>{mastWords(mast.key)}</legend>
          <FieldPair>
            <NumberField
              name={['masts', index, 'footAft']}
              label="Foot, aft of the stem"
              unit={format.lengthUnit}
              required="Write it."
            />
            <NumberField
              name={['masts', index, 'footUp']}
              label="Height of the foot"
              unit={format.lengthUnit}
              required="Write it, 0 on deck."
            />
          </FieldPair>
          <FieldPair>
            <NumberField
              name={['masts', index, 'height']}
              label="Foot to masthead"
              unit={format.lengthUnit}
              required="Write it."
            />
            <NumberField
              name={['masts', index, 'hounds']}
              label="Foot to hounds"
              unit={format.lengthUnit}
              required="Write it."
              hint="Where forestay and cap shrouds end."
            />
          </FieldPair>
          <NumberField
            name={['masts', index, 'rake']}
            label="Rake aft"
            unit="°"
            required="Write it, 0 if plumb."
          />
          {Array.from({ length: pairs[index] }, (_, pair) => (
            <FieldPair key={pair}>
              <NumberField
                name={['masts', index, 'spreaders', pair, 'height']}
                label={`Spreaders ${pair + 1}, height`}
                unit={format.lengthUnit}
                required="Write it, or take the pair away."
              />
              <NumberField
                name={['masts', index, 'spreaders', pair, 'length']}
                label={`Spreaders ${pair + 1}, length of one`}
                unit={format.lengthUnit}
                required="Write it, or take the pair away."
              />
              <NumberField
                name={['masts', index, 'spreaders', pair, 'sweep']}
                label={`Spreaders ${pair + 1}, swept aft`}
                unit="°"
              />
            </FieldPair>
          ))}
          <div className={styles.actions}>
            <PlainButton
              disabled={pairs[index] >= MOST_SPREADERS}
              onClick={() => setPairs(pairs.map((count, at) => (at === index ? count + 1 : count)))}
            >
              Add a pair of spreaders
            </PlainButton>
            {pairs[index] > 0 ? (
              <PlainButton
                onClick={() => setPairs(pairs.map((count, at) => (at === index ? count - 1 : count)))}
              >
                Take the uppermost pair away
              </PlainButton>
            ) : null}
          </div>
        </fieldset>
      ))}
      <ChoiceField
        name="positionId"
        label="Correct the run of a stay"
        clearable
        searchable
        hint="One at a time; the others follow the masts, or what was entered for them."
        choices={drawable.map(({ id, label }) => ({ value: id, label }))}
        onChange={(chosen) => {
          const run = runOf(chosen);
          form.setFieldsValue({
            lower: run ? pointText(run.lower) : NO_POINT,
            upper: run ? pointText(run.upper) : NO_POINT,
          });
        }}
      />
      {positionId
        ? (['lower', 'upper'] as const).map((end) => (
            <fieldset key={end} className={styles.mast}>
              <legend>{end === 'lower' ? 'Lower end' : 'Upper end'}</legend>
              <FieldPair>
                <NumberField
                  name={[end, 'aft']}
                  label="Aft of the stem"
                  unit={format.lengthUnit}
                  required="Write it."
                />
                <NumberField
                  name={[end, 'starboard']}
                  label="To starboard"
                  unit={format.lengthUnit}
                  required="Write it."
                />
                <NumberField
                  name={[end, 'up']}
                  label="Height"
                  unit={format.lengthUnit}
                  required="Write it."
                />
              </FieldPair>
            </fieldset>
          ))
        : null}
    </ContractFormSheet>
  );
}

function initialValues(
  geometry: RigGeometry,
  text: (m: number) => string,
  degrees: (value: number) => string,
): GeometryValues {
  const tip = geometry.bowspritTip;
  return {
    deckLength: text(geometry.deckLengthM),
    beam: text(geometry.beamM),
    sprit: { length: tip ? text(-tip.aftM) : '', up: tip ? text(tip.upM) : '' },
    masts: geometry.masts.map((mast) => ({
      footAft: text(mast.footAftM),
      footUp: text(mast.footUpM),
      height: text(mast.heightM),
      hounds: text(mast.houndsHeightM),
      rake: degrees(mast.rakeDegrees),
      spreaders: mast.spreaders.map((spreader) => ({
        height: text(spreader.heightM),
        length: text(spreader.lengthM),
        sweep: degrees(spreader.sweepDegrees),
      })),
    })),
    lower: NO_POINT,
    upper: NO_POINT,
  };
}

function mastOf(
  mast: MastGeometry,
  values: MastValues,
  pairs: number,
  metres: (typed: string | undefined) => number,
): MastGeometry {
  return {
    key: mast.key,
    stayed: mast.stayed,
    footAftM: metres(values.footAft),
    footUpM: metres(values.footUp),
    heightM: metres(values.height),
    houndsHeightM: metres(values.hounds),
    rakeDegrees: figureOf(values.rake) ?? 0,
    spreaders: values.spreaders.slice(0, pairs).map((spreader) => ({
      heightM: metres(spreader.height),
      lengthM: metres(spreader.length),
      sweepDegrees: figureOf(spreader.sweep) ?? 0,
    })),
  };
}

function mastWords(key: string): string {
  return `${key.charAt(0).toUpperCase()}${key.slice(1)} mast`;
}
