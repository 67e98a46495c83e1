import type { PositionDto } from '@stayledger/shared/contracts/rig';
import {
  addSensorSchema,
  SENSOR_KINDS,
  updateSensorSchema,
  type SensorDto,
  type SensorScale,
} from '@stayledger/shared/contracts/sensors';
import Form from 'antd/es/form';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { FieldPair } from '../../components/forms/field-pair';
import {
  ChoiceField,
  DayField,
  figureOf,
  figureText,
  NumberField,
  TextField,
} from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { useFormat } from '../../lib/formatting/use-format';
import { usePreferences } from '../../lib/session';
import { SENSOR_KIND_WORDS } from './sensor-words';
import { addSensor, updateSensor } from './sensors.queries';

interface SensorValues {
  name: string;
  kind: SensorDto['kind'];
  positionId?: string;
  inLineId?: string;
  fullScaleKn: string;
  errorPercent: string;
  /** Area, stiffness, or the first of two points. */
  scaleFigure: string;
  lowRaw: string;
  lowLoad: string;
  highRaw: string;
  highLoad: string;
  placedOn: string;
  removedOn: string;
  notes: string;
}

interface SensorFormProps {
  vesselId: string;
  positions: readonly PositionDto[];
  sensor?: SensorDto;
  todayOn: string;
  cancelTo: string;
  onDone: () => void | Promise<void>;
  onReload?: () => void;
}

export function SensorForm({
  vesselId,
  positions,
  sensor,
  todayOn,
  cancelTo,
  onDone,
  onReload,
}: SensorFormProps) {
  const format = useFormat();
  const { decimalComma } = usePreferences();
  const force = (typed: string) => {
    const figure = figureOf(typed);
    return figure === null ? null : format.forceToKn(figure);
  };
  const forceText = (kn: number | null | undefined) =>
    kn === null || kn === undefined ? '' : figureText(format.forceFromKn(kn), decimalComma);
  const fields = (values: SensorValues) => ({
    name: values.name,
    kind: values.kind,
    positionId: values.positionId ?? null,
    inLine: values.inLineId ? [values.inLineId] : [],
    fullScaleKn: force(values.fullScaleKn),
    errorPercent: figureOf(values.errorPercent),
    scale: scaleOf(values, force),
    placedOn: values.placedOn || null,
    removedOn: values.removedOn || null,
    notes: values.notes,
  });
  const adding = useContractForm({
    contract: addSensorSchema,
    toInput: fields,
    send: (input, key) => addSensor(vesselId, input, key),
    onDone,
  });
  const changing = useContractForm({
    contract: updateSensorSchema,
    toInput: (values: SensorValues) => ({ ...fields(values), version: sensor?.version }),
    send: (input) => updateSensor(sensor?.id ?? '', input),
    onDone,
  });
  const contractForm = sensor ? changing : adding;
  const kind = Form.useWatch('kind', contractForm.form) ?? sensor?.kind;
  const places = positions.map(({ id, label }) => ({ value: id, label }));
  const points = sensor?.scale?.by === 'two-points' ? sensor.scale : null;
  return (
    <ContractFormSheet<SensorValues>
      name="sensor"
      contractForm={contractForm}
      initialValues={{
        name: sensor?.name ?? '',
        kind: sensor?.kind ?? 'pin',
        positionId: sensor?.positionId ?? undefined,
        inLineId: sensor?.inLine[0],
        fullScaleKn: forceText(sensor?.fullScaleKn),
        errorPercent: figureText(sensor?.errorPercent, decimalComma),
        scaleFigure: scaleText(sensor?.scale ?? null, decimalComma),
        lowRaw: figureText(points?.lowRaw, decimalComma),
        lowLoad: forceText(points?.lowKn),
        highRaw: figureText(points?.highRaw, decimalComma),
        highLoad: forceText(points?.highKn),
        placedOn: sensor?.placedOn ?? '',
        removedOn: sensor?.removedOn ?? '',
        notes: sensor?.notes ?? '',
      }}
      submitLabel={sensor ? 'Save sensor' : 'Add sensor'}
      cancelTo={cancelTo}
      onReload={onReload}
    >
      <FieldPair>
        <TextField name="name" label="Name" required="Give it the name your logger uses." maxLength={80} />
        <ChoiceField
          name="kind"
          label="Kind"
          required="Choose the kind."
          choices={SENSOR_KINDS.map((value) => ({ value, label: SENSOR_KIND_WORDS[value] }))}
        />
      </FieldPair>
      <ChoiceField name="positionId" label="Measures the load of" searchable clearable choices={places} />
      <ChoiceField
        name="inLineId"
        label="The same load goes on into"
        searchable
        clearable
        choices={places}
        hint="Only where nothing joins in between, such as the lashing below a stay. Geometry alone carries no load over."
      />
      {kind === 'ram-pressure' ? (
        <NumberField name="scaleFigure" label="Area of the piston" unit="mm²" />
      ) : null}
      {kind === 'strain' ? (
        <NumberField name="scaleFigure" label="Axial stiffness of what it is bonded to" unit="kN" />
      ) : null}
      {kind === 'raw' ? (
        <>
          <FieldPair>
            <NumberField name="lowRaw" label="Lower raw reading" />
            <NumberField name="lowLoad" label="Its force" unit={format.forceUnit} />
          </FieldPair>
          <FieldPair>
            <NumberField name="highRaw" label="Upper raw reading" />
            <NumberField name="highLoad" label="Its force" unit={format.forceUnit} />
          </FieldPair>
        </>
      ) : null}
      <FieldPair>
        <NumberField name="fullScaleKn" label="Full scale" unit={format.forceUnit} />
        <NumberField name="errorPercent" label="Error class" unit="% of full scale" />
      </FieldPair>
      <FieldPair>
        <DayField name="placedOn" label="Placed on" max={todayOn} />
        <DayField name="removedOn" label="Taken off on" max={todayOn} />
      </FieldPair>
      <TextField name="notes" label="Notes" lines={2} maxLength={2000} />
    </ContractFormSheet>
  );
}

function scaleOf(values: SensorValues, force: (typed: string) => number | null): SensorScale | null {
  const figure = figureOf(values.scaleFigure);
  if (values.kind === 'ram-pressure') return figure === null ? null : { by: 'ram-area', areaMm2: figure };
  if (values.kind === 'strain')
    return figure === null ? null : { by: 'axial-stiffness', axialStiffnessKn: figure };
  if (values.kind !== 'raw') return null;
  const typed = [values.lowRaw, values.lowLoad, values.highRaw, values.highLoad];
  if (typed.every((text) => text.trim() === '')) return null;
  return {
    by: 'two-points',
    lowRaw: figureOf(values.lowRaw) ?? Number.NaN,
    lowKn: force(values.lowLoad) ?? Number.NaN,
    highRaw: figureOf(values.highRaw) ?? Number.NaN,
    highKn: force(values.highLoad) ?? Number.NaN,
  };
}

function scaleText(scale: SensorScale | null, decimalComma: boolean): string {
  if (scale?.by === 'ram-area') return figureText(scale.areaMm2, decimalComma);
  if (scale?.by === 'axial-stiffness') return figureText(scale.axialStiffnessKn, decimalComma);
  return '';
}
