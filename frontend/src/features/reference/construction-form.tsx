import {
  addConstructionSchema,
  reviseConstructionSchema,
  type ConstructionDto,
  type ListedConstructionDto,
} from '@stayledger/shared/contracts/constructions';
import Form from 'antd/es/form';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { FieldPair } from '../../components/forms/field-pair';
import { ChoiceField, figureOf, figureText, NumberField, TextField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { PlainButton } from '../../components/plain-button/plain-button';
import { useFormat } from '../../lib/formatting/use-format';
import { useSession } from '../../lib/session';
import { addConstruction, reviseConstruction } from './reference.mutations';
import { PROVENANCE_WORDS } from './reference-words';
import styles from './reference.module.css';

interface SizeValues {
  diameterMm: string;
  metallicAreaMm2: string;
  breakingLoad: string;
  massKgPerM: string;
}

interface ConstructionValues {
  name: string;
  /** Construction of the product it is made like: gives lay, material and calendar rule. */
  likeId: string;
  youngGpa: string;
  sizes: SizeValues[];
  source: string;
  provenance: ConstructionDto['provenance'];
  provenanceNote: string;
}

interface ConstructionFormProps {
  construction?: ListedConstructionDto;
  /** What comes with the product, to choose from. */
  shipped: ListedConstructionDto[];
  cancelTo: string;
  onDone: (construction: ListedConstructionDto) => void | Promise<void>;
  onReload?: () => void;
}

const NO_SIZE: SizeValues = { diameterMm: '', metallicAreaMm2: '', breakingLoad: '', massKgPerM: '' };

/** A maker's table or a certificate as a construction of the firm's own. */
export function ConstructionForm({
  construction,
  shipped,
  cancelTo,
  onDone,
  onReload,
}: ConstructionFormProps) {
  const format = useFormat();
  const { decimalComma } = useSession().user.preferences;
  const text = (value: number | null | undefined) => figureText(value, decimalComma);
  const toInput = (values: ConstructionValues) => {
    const like = shipped.find(({ id }) => id === values.likeId);
    return {
      name: values.name,
      kind: like?.kind,
      materialId: like?.materialId,
      replacementRuleId: like?.replacementRuleId ?? null,
      youngGpa: figureOf(values.youngGpa),
      sizes: values.sizes.map((size) => ({
        diameterMm: figureOf(size.diameterMm),
        metallicAreaMm2: figureOf(size.metallicAreaMm2),
        breakingLoadKn: format.forceToKn(figureOf(size.breakingLoad) ?? Number.NaN),
        massKgPerM: figureOf(size.massKgPerM),
      })),
      source: values.source,
      provenance: values.provenance,
      provenanceNote: values.provenanceNote,
    };
  };
  const adding = useContractForm({
    contract: addConstructionSchema,
    toInput,
    send: (input, key) => addConstruction(input, key),
    onDone,
  });
  const correcting = useContractForm({
    contract: reviseConstructionSchema,
    toInput: (values: ConstructionValues) => ({ ...toInput(values), version: construction?.version }),
    send: (input, key) => reviseConstruction(construction?.id ?? '', input, key),
    onDone,
  });
  const contractForm = construction ? correcting : adding;

  return (
    <ContractFormSheet<ConstructionValues>
      name="construction"
      contractForm={contractForm}
      initialValues={{
        name: construction?.name ?? '',
        likeId: construction && likeOf(construction, shipped),
        youngGpa: text(construction?.youngGpa),
        sizes: construction?.sizes.map((size) => ({
          diameterMm: text(size.diameterMm),
          metallicAreaMm2: text(size.metallicAreaMm2),
          breakingLoad: text(format.forceFromKn(size.breakingLoads[0].breakingLoadKn)),
          massKgPerM: text(size.massKgPerM),
        })) ?? [NO_SIZE],
        source: construction?.source ?? '',
        provenance: construction?.provenance,
        provenanceNote: construction?.provenanceNote ?? '',
      }}
      submitLabel={construction ? `Save as version ${construction.version + 1}` : 'Add the construction'}
      cancelTo={cancelTo}
      onReload={onReload}
    >
      <TextField
        name="name"
        label="Called"
        required="Give it a name."
        maxLength={120}
        placeholder="1x19 strand by certificate"
      />
      <FieldPair>
        <ChoiceField
          name="likeId"
          label="Made like"
          required="Choose what it is made like."
          hint="Lay, material and calendar rule are taken from there."
          choices={shipped.map(({ id, name }) => ({ value: id, label: name }))}
          onChange={(id) => {
            if (contractForm.form.getFieldValue('youngGpa')) return;
            contractForm.form.setFieldValue('youngGpa', text(shipped.find((one) => one.id === id)?.youngGpa));
          }}
        />
        <NumberField
          name="youngGpa"
          label="Modulus as built"
          required="Write the modulus."
          unit="GPa"
          between={[1, 400]}
        />
      </FieldPair>
      <Form.List name="sizes">
        {(fields, { add, remove }) => (
          <fieldset className={styles.sizes}>
            <legend>Sizes</legend>
            {fields.map(({ key, name }, index) => (
              <div key={key} className={styles.size} role="group" aria-label={`Size ${index + 1}`}>
                <NumberField
                  name={[name, 'diameterMm']}
                  label="Diameter"
                  unit="mm"
                  between={[0.1, 120]}
                  required="Write the diameter."
                />
                <NumberField
                  name={[name, 'metallicAreaMm2']}
                  label="Metallic area"
                  unit="mm²"
                  between={[0.01, 12_000]}
                  required="Write the area."
                />
                <NumberField
                  name={[name, 'breakingLoad']}
                  label="Breaking load"
                  unit={format.forceUnit}
                  between={[0.001, 1e8]}
                  required="Write the breaking load."
                />
                <NumberField
                  name={[name, 'massKgPerM']}
                  label="Mass"
                  unit="kg/m"
                  between={[0.0001, 200]}
                  required="Write the mass."
                />
                {fields.length > 1 ? (
                  <PlainButton onClick={() => remove(name)} aria-label={`Remove size ${index + 1}`}>
                    Remove
                  </PlainButton>
                ) : null}
              </div>
            ))}
            <PlainButton onClick={() => add(NO_SIZE)}>Add a size</PlainButton>
          </fieldset>
        )}
      </Form.List>
      <TextField
        name="source"
        label="Source"
        required="Name the source: the table or certificate and its date."
        maxLength={400}
        lines={2}
      />
      <ChoiceField
        name="provenance"
        label="How the figures came here"
        required="Choose how the figures came here."
        choices={(Object.keys(PROVENANCE_WORDS) as ConstructionDto['provenance'][]).map((value) => ({
          value,
          label: `${PROVENANCE_WORDS[value].charAt(0).toUpperCase()}${PROVENANCE_WORDS[value].slice(1)}`,
        }))}
      />
      <TextField
        name="provenanceNote"
        label="Read or made how"
        required="Say how the figures were read or made."
        maxLength={800}
        lines={3}
      />
    </ContractFormSheet>
  );
}

/** What of the product a stored construction was made like. */
function likeOf(own: ListedConstructionDto, shipped: ListedConstructionDto[]): string | undefined {
  return shipped.find(
    ({ kind, materialId, replacementRuleId }) =>
      kind === own.kind && materialId === own.materialId && replacementRuleId === own.replacementRuleId,
  )?.id;
}
