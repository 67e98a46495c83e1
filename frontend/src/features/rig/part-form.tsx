import type { ConstructionDto } from '@stayledger/shared/contracts/constructions';
import {
  describedPartSchema,
  fitPartSchema,
  type DescribedPartInput,
  type TERMINALS,
  updatePartSchema,
  type FittedPartDto,
} from '@stayledger/shared/contracts/parts';
import Checkbox from 'antd/es/checkbox';
import Form from 'antd/es/form';
import Radio from 'antd/es/radio';
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
import { check } from '../../lib/contract';
import { useFormat } from '../../lib/formatting/use-format';
import { usePreferences } from '../../lib/session';
import { HardwareFields } from './hardware-fields';
import { hardwareOf, hardwareValues, type HardwareValues } from './hardware-values';
import { KIND_OF_WIRE_WORDS, TERMINAL_WORDS, terminalsFor } from './part-words';
import { fitPart, updatePart } from './rig.mutations';
import { StrengthPreview } from './strength-preview';

type Terminal = (typeof TERMINALS)[number];

interface PartValues {
  constructionId: string;
  /** One of the construction's diameters, as text. */
  diameterMm: string;
  breakingLoadSource: 'table' | 'certificate';
  breakingLoadKn: string;
  certificate: string;
  lengthM: string;
  upperTerminal: Terminal;
  lowerTerminal: Terminal;
  threadSize: string;
  pinDiameterMm: string;
  hardware: HardwareValues;
  batch: string;
  fittedOn: string;
  notes: string;
  alsoOtherSide: boolean;
}

interface PartFormProps {
  positionId: string;
  /** True where the same place on the other side is there and empty. */
  twinIsEmpty?: boolean;
  part?: FittedPartDto;
  constructions: ConstructionDto[];
  todayOn: string;
  cancelTo: string;
  onDone: (part: FittedPartDto) => void | Promise<void>;
  onReload?: () => void;
}

export function PartForm(props: PartFormProps) {
  const { positionId, twinIsEmpty = false, part, constructions, todayOn, cancelTo, onDone, onReload } = props;
  const format = useFormat();
  const { decimalComma } = usePreferences();
  const sizeOf = (constructionId: string | undefined, diameterMm: string | undefined) =>
    constructions
      .find(({ id }) => id === constructionId)
      ?.sizes.find((size) => String(size.diameterMm) === diameterMm);

  const fields = (values: PartValues) => {
    const length = figureOf(values.lengthM);
    const load = figureOf(values.breakingLoadKn);
    const certified = values.breakingLoadSource === 'certificate';
    return {
      constructionId: values.constructionId,
      diameterMm: sizeOf(values.constructionId, values.diameterMm)?.diameterMm ?? part?.diameterMm,
      breakingLoadKn: certified && load !== null ? format.forceToKn(load) : null,
      breakingLoadFromCertificate: certified,
      lengthM: length === null ? null : format.lengthToM(length),
      upperTerminal: values.upperTerminal,
      lowerTerminal: values.lowerTerminal,
      threadSize: values.threadSize.trim() || null,
      pinDiameterMm: figureOf(values.pinDiameterMm),
      hardware: hardwareOf(values.hardware, format.forceToKn),
      batch: values.batch.trim(),
      certificate: values.certificate.trim(),
      fittedOn: values.fittedOn || null,
      notes: values.notes,
    };
  };
  const fitting = useContractForm({
    contract: fitPartSchema,
    toInput: (values: PartValues) => ({
      ...fields(values),
      alsoOtherSide: twinIsEmpty && values.alsoOtherSide,
    }),
    send: (input, key) => fitPart(positionId, input, key),
    onDone,
  });
  const changing = useContractForm({
    contract: updatePartSchema,
    toInput: (values: PartValues) => ({ ...fields(values), version: part?.version }),
    send: (input) => updatePart(part?.id ?? '', input),
    onDone,
  });
  const contractForm = part ? changing : fitting;
  const { form } = contractForm;
  const constructionId = Form.useWatch('constructionId', form) ?? part?.constructionId;
  const diameter = Form.useWatch('diameterMm', form);
  const source = Form.useWatch('breakingLoadSource', form);
  // Renders anew with every change; the values themselves also hold what a hidden field keeps.
  const described = Form.useWatch((values: PartValues) => values, form);
  const construction = constructions.find(({ id }) => id === constructionId);
  const size = sizeOf(constructionId, diameter);
  const storedSize = constructions
    .find(({ id }) => id === part?.constructionId)
    ?.sizes.find(({ diameterMm }) => Math.abs(diameterMm - (part?.diameterMm ?? 0)) < 0.02);
  const terminalChoices = terminalsFor(construction?.kindOfWire).map((value) => ({
    value,
    label: TERMINAL_WORDS[value],
  }));

  return (
    <ContractFormSheet<PartValues>
      name="part"
      contractForm={contractForm}
      initialValues={{
        constructionId: part?.constructionId,
        diameterMm: storedSize ? String(storedSize.diameterMm) : undefined,
        breakingLoadSource: part?.breakingLoadSource === 'certificate' ? 'certificate' : 'table',
        breakingLoadKn:
          part?.breakingLoadSource === 'certificate'
            ? figureText(format.forceFromKn(part.breakingLoadKn), decimalComma)
            : '',
        certificate: part?.certificate ?? '',
        lengthM: part?.lengthM ? figureText(format.lengthFromM(part.lengthM), decimalComma) : '',
        upperTerminal: part?.upperTerminal ?? 'unknown',
        lowerTerminal: part?.lowerTerminal ?? 'unknown',
        threadSize: part?.threadSize ?? '',
        pinDiameterMm: figureText(part?.pinDiameterMm, decimalComma),
        hardware: hardwareValues(part?.hardware ?? null, (kn) =>
          figureText(format.forceFromKn(kn), decimalComma),
        ),
        batch: part?.batch ?? '',
        fittedOn: part?.fittedOn ?? '',
        notes: part?.notes ?? '',
        alsoOtherSide: false,
      }}
      submitLabel={part ? 'Save part' : 'Fit this part'}
      cancelTo={cancelTo}
      onReload={onReload}
    >
      <ChoiceField
        name="constructionId"
        label="Construction"
        required="Choose how the wire, rod or rope is built."
        searchable
        choices={constructionChoices(constructions)}
        onChange={(next) => {
          const kept = sizeOf(next, form.getFieldValue('diameterMm') as string | undefined);
          if (!kept) form.setFieldValue('diameterMm', undefined);
          const allowed = terminalsFor(constructions.find(({ id }) => id === next)?.kindOfWire);
          for (const end of ['upperTerminal', 'lowerTerminal'] as const) {
            if (!allowed.includes(form.getFieldValue(end) as Terminal)) form.setFieldValue(end, 'unknown');
          }
        }}
      />
      <ChoiceField
        name="diameterMm"
        label="Diameter"
        required="Choose the diameter."
        disabled={!construction}
        placeholder={construction ? 'Choose' : 'Choose the construction first'}
        choices={(construction?.sizes ?? []).map(({ designation, diameterMm }) => ({
          value: String(diameterMm),
          label:
            designation === `${diameterMm} mm`
              ? designation
              : `${designation} (${format.diameter(diameterMm)})`,
        }))}
      />
      <Form.Item
        name="breakingLoadSource"
        label="Breaking load of the wire itself"
        extra={tableLoadWords(size, format)}
      >
        <Radio.Group
          options={[
            { value: 'table', label: 'From the table' },
            { value: 'certificate', label: 'From a certificate' },
          ]}
        />
      </Form.Item>
      {source === 'certificate' ? (
        <FieldPair>
          <NumberField
            name="breakingLoadKn"
            label="Certified breaking load"
            unit={format.forceUnit}
            required="Write the figure of the certificate, or take the table's."
          />
          <TextField name="certificate" label="Certificate" maxLength={200} />
        </FieldPair>
      ) : null}
      <FieldPair>
        <ChoiceField
          name="upperTerminal"
          label="Upper terminal"
          required="Choose, or say not known."
          choices={terminalChoices}
        />
        <ChoiceField
          name="lowerTerminal"
          label="Lower terminal"
          required="Choose, or say not known."
          choices={terminalChoices}
        />
      </FieldPair>
      <FieldPair>
        <TextField
          name="threadSize"
          label="Thread of the turnbuckle"
          maxLength={20}
          placeholder="M12, M12x1.25, 1/2-20 UNF"
          hint="Unknown, the thread is not assessed."
        />
        <NumberField
          name="pinDiameterMm"
          label="Clevis pin diameter"
          unit="mm"
          hint="Unknown, the pin is not assessed."
        />
      </FieldPair>
      <HardwareFields unit={format.forceUnit} />
      <StrengthPreview
        input={
          described?.constructionId ? describedPart(fields(form.getFieldsValue(true) as PartValues)) : null
        }
      />
      <FieldPair>
        <DayField
          name="fittedOn"
          label="Fitted on"
          max={todayOn}
          hint="Not known: calendar rules run from the vessel's build year."
        />
        <NumberField name="lengthM" label="Length" unit={format.lengthUnit} />
      </FieldPair>
      <TextField name="batch" label="Batch" maxLength={120} />
      <TextField name="notes" label="Notes" lines={2} maxLength={4000} />
      {twinIsEmpty && !part ? (
        <Form.Item name="alsoOtherSide" valuePropName="checked">
          <Checkbox>Fit the same on the other side</Checkbox>
        </Form.Item>
      ) : null}
    </ContractFormSheet>
  );
}

/** The fields the strength hangs on, as soon as they can be meant. */
function describedPart(fields: unknown): DescribedPartInput | null {
  const { constructionId, diameterMm, breakingLoadKn, upperTerminal, lowerTerminal, hardware } =
    fields as DescribedPartInput;
  const checked = check(describedPartSchema, {
    constructionId,
    diameterMm,
    breakingLoadKn,
    upperTerminal,
    lowerTerminal,
    hardware,
  });
  return checked.ok ? checked.value : null;
}

function constructionChoices(constructions: ConstructionDto[]) {
  return (['strand', 'rod', 'fibre'] as const).map((kind) => ({
    label: KIND_OF_WIRE_WORDS[kind],
    options: constructions
      .filter((construction) => construction.kindOfWire === kind)
      .map(({ id, name }) => ({ value: id, label: name })),
  }));
}

/** What the table gives for a size, and that the lower grade is taken where nobody knows the grade. */
function tableLoadWords(
  size: ConstructionDto['sizes'][number] | undefined,
  format: ReturnType<typeof useFormat>,
): string {
  if (!size) return 'The table figure shows once construction and diameter are chosen.';
  const loads = [...size.breakingLoads].sort((a, b) => a.breakingLoadKn - b.breakingLoadKn);
  const [lowest] = loads;
  const figure = format.force(lowest.breakingLoadKn);
  if (loads.length === 1) return `Table: ${figure}.`;
  const highest = loads[loads.length - 1];
  return `Table: ${figure} for the lower wire grade, ${format.force(highest.breakingLoadKn)} for the higher. Without a certificate the lower one counts, and is flagged.`;
}
