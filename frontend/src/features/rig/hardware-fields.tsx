import { ARTICULATIONS } from '@stayledger/shared/contracts/parts';
import Form from 'antd/es/form';
import { FieldPair } from '../../components/forms/field-pair';
import { ChoiceField, NumberField } from '../../components/forms/fields';
import { HARDWARE_ELEMENTS } from './hardware-values';
import styles from './rig.module.css';

const ELEMENT_WORDS = {
  turnbuckle: 'Turnbuckle',
  toggle: 'Toggle',
  pin: 'Clevis pin',
  chainplate: 'Chainplate',
} as const;
const ARTICULATION_WORDS = {
  'both-planes': 'Turns in both planes (toggle, ball)',
  'one-plane': 'Turns in one plane (pin)',
  none: 'Does not turn',
  seized: 'Should turn and is seized',
} as const;
const THERE = [
  { value: 'yes', label: 'Fitted' },
  { value: 'no', label: 'None here' },
];
const articulations = ARTICULATIONS.map((value) => ({ value, label: ARTICULATION_WORDS[value] }));

/** What stands in line with the wire, each with its breaking load, and how the ends turn. */
export function HardwareFields({ unit }: { unit: string }) {
  return (
    <fieldset className={styles.mast}>
      <legend>In line with the wire</legend>
      {HARDWARE_ELEMENTS.map((element) => (
        <FieldPair key={element}>
          <ChoiceField
            name={['hardware', element, 'there']}
            label={ELEMENT_WORDS[element]}
            required="Choose."
            choices={THERE}
          />
          <Form.Item noStyle dependencies={[['hardware', element, 'there']]}>
            {({ getFieldValue }) =>
              getFieldValue(['hardware', element, 'there']) === 'no' ? null : (
                <NumberField
                  name={['hardware', element, 'load']}
                  label={`${ELEMENT_WORDS[element]}, breaking load`}
                  unit={unit}
                />
              )
            }
          </Form.Item>
        </FieldPair>
      ))}
      <FieldPair>
        <ChoiceField
          name={['hardware', 'upperArticulation']}
          label="Upper end"
          clearable
          placeholder="Nobody looked"
          choices={articulations}
        />
        <ChoiceField
          name={['hardware', 'lowerArticulation']}
          label="Lower end"
          clearable
          placeholder="Nobody looked"
          choices={articulations}
        />
      </FieldPair>
    </fieldset>
  );
}
