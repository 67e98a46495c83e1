import {
  addSensorEventSchema,
  RIG_STATES,
  SENSOR_EVENT_KINDS,
  type SensorEventDto,
} from '@stayledger/shared/contracts/sensors';
import Form from 'antd/es/form';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { FieldPair } from '../../components/forms/field-pair';
import { ChoiceField, DayField, figureOf, NumberField, TextField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { useFormat } from '../../lib/formatting/use-format';
import { EVENT_KIND_WORDS, RIG_STATE_WORDS } from './sensor-words';
import { addSensorEvent } from './sensors.queries';

interface EventValues {
  kind: SensorEventDto['kind'];
  doneOn: string;
  reading: string;
  rigState?: NonNullable<SensorEventDto['rigState']>;
  statedTension: string;
  batteryHours: string;
  note: string;
}

interface SensorEventFormProps {
  sensorId: string;
  todayOn: string;
  cancelTo: string;
  onDone: () => void | Promise<void>;
}

/** A zero check, a calibration or a battery. What was recorded is kept; a mistake is set right by a newer one. */
export function SensorEventForm({ sensorId, todayOn, cancelTo, onDone }: SensorEventFormProps) {
  const format = useFormat();
  const force = (typed: string) => {
    const figure = figureOf(typed);
    return figure === null ? null : format.forceToKn(figure);
  };
  const contractForm = useContractForm({
    contract: addSensorEventSchema,
    toInput: (values: EventValues) => {
      const zero = values.kind === 'zero-check';
      return {
        kind: values.kind,
        doneOn: values.doneOn,
        readingKn: zero ? force(values.reading) : null,
        rigState: zero ? (values.rigState ?? null) : null,
        statedTensionKn: zero ? force(values.statedTension) : null,
        batteryHours: values.kind === 'battery' ? figureOf(values.batteryHours) : null,
        note: values.note,
      };
    },
    send: (input, key) => addSensorEvent(sensorId, input, key),
    onDone,
  });
  const kind = Form.useWatch('kind', contractForm.form) ?? 'zero-check';
  return (
    <ContractFormSheet<EventValues>
      name="sensor-event"
      contractForm={contractForm}
      initialValues={{
        kind: 'zero-check',
        doneOn: todayOn,
        reading: '',
        statedTension: '',
        batteryHours: '',
        note: '',
      }}
      submitLabel="Record it"
      cancelTo={cancelTo}
    >
      <FieldPair>
        <ChoiceField
          name="kind"
          label="What was done"
          required="Choose."
          choices={SENSOR_EVENT_KINDS.map((value) => ({ value, label: EVENT_KIND_WORDS[value] }))}
        />
        <DayField name="doneOn" label="On" required="Give the day." max={todayOn} />
      </FieldPair>
      {kind === 'zero-check' ? (
        <>
          <FieldPair>
            <NumberField
              name="reading"
              label="The sensor showed"
              unit={format.forceUnit}
              required="Write what it showed."
            />
            <ChoiceField
              name="rigState"
              label="The rig stood"
              required="Say how the rig stood."
              choices={RIG_STATES.map((value) => ({ value, label: RIG_STATE_WORDS[value] }))}
            />
          </FieldPair>
          <NumberField
            name="statedTension"
            label="Tension known otherwise"
            unit={format.forceUnit}
            hint="A zero taken under dock tune is off by that tension; with it the zero can be set right."
          />
        </>
      ) : null}
      {kind === 'battery' ? (
        <NumberField name="batteryHours" label="Good for" unit="h" required="Write the hours." />
      ) : null}
      <TextField name="note" label="Note" lines={2} maxLength={1000} />
    </ContractFormSheet>
  );
}
