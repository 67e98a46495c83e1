import {
  addCurveSchema,
  reviseCurveSchema,
  type AddCurveInput,
  type CurveDto,
  type ListedCurveDto,
} from '@stayledger/shared/contracts/curves';
import Form from 'antd/es/form';
import { useMemo } from 'react';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { FieldPair } from '../../components/forms/field-pair';
import { ChoiceField, figureOf, figureText, NumberField, TextField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { useSession } from '../../lib/session';
import { CurveChart } from './curve-chart';
import { lineOfSegments, segmentsOfLine, type CurveLine } from './curve-line';
import { addCurve, reviseCurve } from './reference.mutations';
import { ENVIRONMENT_WORDS, MEASURE_WORDS, measureUnit, PROVENANCE_WORDS } from './reference-words';

type Level = AddCurveInput['level'];

interface CurveValues {
  name: string;
  appliesTo: string;
  measure: CurveDto['measure'];
  environment: CurveDto['environment'];
  level: Level;
  k: string;
  sdLog10N: string;
  rangeAtTwoMillion: string;
  slope: string;
  kneeCycles: string;
  kneeSlope: string;
  minRange: string;
  maxRange: string;
  source: string;
  provenance: CurveDto['provenance'];
  provenanceNote: string;
  analogyNote: string;
}

interface CurveFormProps {
  /** The curve to correct; left out, one is added. */
  curve?: ListedCurveDto;
  cancelTo: string;
  onDone: (curve: ListedCurveDto) => void | Promise<void>;
  onReload?: () => void;
}

const LEVEL_CHOICES: { value: Level; label: string }[] = [
  { value: 'mean', label: 'Mean of the tests' },
  { value: 'mean-minus-k-sd', label: 'Mean less some standard deviations' },
  { value: 'unknown', label: 'The source does not say' },
];

export function CurveForm({ curve, cancelTo, onDone, onReload }: CurveFormProps) {
  const { decimalComma } = useSession().user.preferences;
  const adding = useContractForm({
    contract: addCurveSchema,
    toInput: (values: CurveValues) => toInput(values),
    send: (input, key) => addCurve(input, key),
    onDone,
  });
  const correcting = useContractForm({
    contract: reviseCurveSchema,
    toInput: (values: CurveValues) => ({ ...toInput(values), version: curve?.version }),
    send: (input, key) => reviseCurve(curve?.id ?? '', input, key),
    onDone,
  });
  const contractForm = curve ? correcting : adding;
  const line = curve ? lineOfSegments(curve.segments) : null;
  const text = (value: number | null | undefined) => figureText(value, decimalComma);
  const level = Form.useWatch('level', contractForm.form);
  const measure = Form.useWatch('measure', contractForm.form);
  const kneeCycles = Form.useWatch('kneeCycles', contractForm.form);
  const kneeSlope = Form.useWatch('kneeSlope', contractForm.form);
  const unit = measure ? measureUnit(measure) : '';

  return (
    <ContractFormSheet<CurveValues>
      name="curve"
      contractForm={contractForm}
      initialValues={{
        name: curve?.name ?? '',
        appliesTo: curve?.appliesTo ?? '',
        measure: curve?.measure ?? 'stress-metallic',
        environment: curve?.environment ?? 'air',
        level: curve && curve.level !== 'fractile-95-75' ? curve.level : 'mean-minus-k-sd',
        k: text(curve?.k),
        sdLog10N: text(curve?.sdLog10N),
        rangeAtTwoMillion: text(line?.rangeAtTwoMillion),
        slope: text(line?.slope),
        kneeCycles: text(line?.knee?.cycles),
        kneeSlope: text(line?.knee?.slope),
        minRange: text(curve?.validity.minRange),
        maxRange: text(curve?.validity.maxRange),
        source: curve?.source ?? '',
        provenance: curve?.provenance,
        provenanceNote: curve?.provenanceNote ?? '',
        analogyNote: curve?.analogyNote ?? '',
      }}
      submitLabel={curve ? `Save as version ${curve.version + 1}` : 'Add the curve'}
      cancelTo={cancelTo}
      onReload={onReload}
    >
      <TextField name="name" label="Called" required="Give the curve a name." maxLength={120} />
      <TextField
        name="appliesTo"
        label="What was tested"
        required="Say which part was tested."
        maxLength={200}
        placeholder="1x19 strand, 10 mm, with swaged eyes"
      />
      <ChoiceField
        name="measure"
        label="Measured as"
        required="Choose the measure."
        choices={choices(MEASURE_WORDS)}
      />
      <ChoiceField
        name="environment"
        label="Tested"
        required="Choose the environment."
        choices={choices(ENVIRONMENT_WORDS)}
      />
      <FieldPair>
        <NumberField
          name="rangeAtTwoMillion"
          label="Range at two million cycles"
          required="Write the range, peak to trough."
          unit={unit}
          hint="Peak to trough. A line that ends earlier is carried on to there."
          between={[1e-6, 1e5]}
        />
        <NumberField
          name="slope"
          label="Slope m"
          required="Write the slope."
          hint="Life falls with the range to this power."
          between={[1, 30]}
        />
      </FieldPair>
      <FieldPair>
        <NumberField
          name="kneeCycles"
          label="Knee at, cycles"
          hint="Where the slope changes. Leave both empty for one line."
          between={[1e4, 1e9]}
          required={kneeSlope ? 'Write the cycles at the knee, or empty both.' : undefined}
        />
        <NumberField
          name="kneeSlope"
          label="Slope below the knee"
          between={[1, 30]}
          required={kneeCycles ? 'Write the slope below the knee, or empty both.' : undefined}
        />
      </FieldPair>
      <FieldPair>
        <NumberField name="minRange" label="Smallest range tested" unit={unit} between={[1e-6, 1e5]} />
        <NumberField name="maxRange" label="Largest range tested" unit={unit} between={[1e-6, 1e5]} />
      </FieldPair>
      <ChoiceField
        name="level"
        label="Where the line lies"
        required="Choose where the line lies."
        choices={LEVEL_CHOICES}
      />
      <FieldPair>
        {level === 'mean-minus-k-sd' ? (
          <NumberField
            name="k"
            label="Standard deviations below the mean"
            required="Write how many."
            between={[0.01, 5]}
          />
        ) : null}
        <NumberField
          name="sdLog10N"
          label="Scatter of log10 of cycles"
          hint="Standard deviation; leave it empty if the source gives none."
          between={[0.001, 2]}
        />
      </FieldPair>
      <TextField
        name="source"
        label="Source"
        required="Name the source: the report, its number and its date."
        maxLength={400}
        lines={2}
      />
      <ChoiceField
        name="provenance"
        label="How the figures came here"
        required="Choose how the figures came here."
        choices={choices(PROVENANCE_WORDS)}
      />
      <TextField
        name="provenanceNote"
        label="Read or made how"
        required="Say how the figures were read or made."
        maxLength={800}
        lines={3}
      />
      <TextField
        name="analogyNote"
        label="How far from the part it will serve"
        required="Say how far the tests are from the part it will serve."
        maxLength={400}
        lines={2}
      />
      <Preview form={contractForm.form} />
    </ContractFormSheet>
  );
}

/** The line as it will be drawn, as soon as there is one. */
function Preview({ form }: { form: ReturnType<typeof Form.useForm<CurveValues>>[0] }) {
  const values = Form.useWatch((all: Partial<CurveValues>) => all, form);
  const drawn = useMemo(() => {
    const line = values ? lineOf(values) : null;
    return line ? segmentsOfLine(line) : null;
  }, [values]);
  if (!drawn || !values?.measure) {
    return <p className="soft">The line is drawn here once it has a range and a slope.</p>;
  }
  return (
    <CurveChart
      title="The line as it will stand"
      csvName="curve"
      curve={{
        name: values.name?.trim() ? values.name : 'New curve',
        measure: values.measure,
        segments: drawn,
        validity: { minRange: bound(values.minRange), maxRange: bound(values.maxRange), note: '' },
        cutOffRange: null,
      }}
    />
  );
}

function lineOf(values: Partial<CurveValues>): CurveLine | null {
  const range = figureOf(values.rangeAtTwoMillion);
  const slope = figureOf(values.slope);
  if (!isAbove(range, 0) || !isAbove(slope, 0)) return null;
  const cycles = figureOf(values.kneeCycles);
  const kneeSlope = figureOf(values.kneeSlope);
  const knee = isAbove(cycles, 1) && isAbove(kneeSlope, 0) ? { cycles, slope: kneeSlope } : null;
  return { rangeAtTwoMillion: range, slope, knee };
}

function isAbove(value: number | null, least: number): value is number {
  return value !== null && value > least;
}

function bound(text: string | undefined): number | null {
  const value = figureOf(text);
  return isAbove(value, 0) ? value : null;
}

function toInput(values: CurveValues) {
  const line = lineOf(values);
  return {
    name: values.name,
    appliesTo: values.appliesTo,
    measure: values.measure,
    level: values.level,
    k: values.level === 'mean-minus-k-sd' ? (figureOf(values.k) ?? 0) : 0,
    sdLog10N: figureOf(values.sdLog10N),
    environment: values.environment,
    segments: line ? segmentsOfLine(line) : [],
    validity: { minRange: figureOf(values.minRange), maxRange: figureOf(values.maxRange) },
    source: values.source,
    provenance: values.provenance,
    provenanceNote: values.provenanceNote,
    analogyNote: values.analogyNote,
  };
}

function choices<Key extends string>(words: Record<Key, string>): { value: Key; label: string }[] {
  return (Object.keys(words) as Key[]).map((value) => ({
    value,
    label: `${words[value].charAt(0).toUpperCase()}${words[value].slice(1)}`,
  }));
}
