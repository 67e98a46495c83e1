import {
  createVesselSchema,
  RIG_TYPES,
  updateVesselSchema,
  USE_KINDS,
  type VesselDto,
} from '@stayledger/shared/contracts/vessels';
import { ContractFormSheet } from '../../components/forms/contract-form-sheet';
import { FieldPair } from '../../components/forms/field-pair';
import { ChoiceField, figureOf, figureText, NumberField, TextField } from '../../components/forms/fields';
import { useContractForm } from '../../components/forms/use-contract-form';
import { browserZone } from '../../lib/clock';
import { useFormat } from '../../lib/formatting/use-format';
import { usePreferences, useSession } from '../../lib/session';
import { registerVessel, updateVessel } from './vessels.mutations';
import { RIG_TYPE_WORDS, USE_KIND_WORDS } from './vessel-words';

interface VesselValues {
  name: string;
  rigType: VesselDto['rigType'];
  useKind: VesselDto['useKind'];
  zone: string;
  buildYear: string;
  lengthM: string;
  homePort: string;
  notes: string;
  firmId?: string;
}

interface VesselFormProps {
  /** The vessel to change; without it one is registered. */
  vessel?: VesselDto;
  cancelTo: string;
  onDone: (vessel: VesselDto) => void | Promise<void>;
  onReload?: () => void;
}

export function VesselForm({ vessel, cancelTo, onDone, onReload }: VesselFormProps) {
  const format = useFormat();
  const { decimalComma } = usePreferences();
  const firms = useFirmsLookingAfter();
  const fields = (values: VesselValues) => {
    const length = figureOf(values.lengthM);
    return {
      name: values.name,
      rigType: values.rigType,
      useKind: values.useKind,
      zone: values.zone,
      buildYear: figureOf(values.buildYear),
      lengthM: length === null ? null : format.lengthToM(length),
      homePort: values.homePort.trim() || null,
      notes: values.notes,
    };
  };
  const registering = useContractForm({
    contract: createVesselSchema,
    toInput: (values: VesselValues) => ({ ...fields(values), firmId: values.firmId ?? firms[0]?.value }),
    send: registerVessel,
    onDone,
  });
  const changing = useContractForm({
    contract: updateVesselSchema,
    toInput: (values: VesselValues) => ({ ...fields(values), version: vessel?.version }),
    send: (input) => updateVessel(vessel?.id ?? '', input),
    onDone,
  });

  return (
    <ContractFormSheet<VesselValues>
      name="vessel"
      contractForm={vessel ? changing : registering}
      initialValues={{
        name: vessel?.name ?? '',
        rigType: vessel?.rigType,
        useKind: vessel?.useKind ?? 'private',
        zone: vessel?.zone ?? browserZone(),
        buildYear: figureText(vessel?.buildYear, decimalComma),
        lengthM: vessel?.lengthM ? figureText(format.lengthFromM(vessel.lengthM), decimalComma) : '',
        homePort: vessel?.homePort ?? '',
        notes: vessel?.notes ?? '',
        firmId: vessel?.firmId ?? firms[0]?.value,
      }}
      submitLabel={vessel ? 'Save vessel' : 'Register vessel'}
      cancelTo={cancelTo}
      onReload={onReload}
    >
      <TextField name="name" label="Name" required="Give the vessel a name." maxLength={120} />
      <FieldPair>
        <ChoiceField
          name="rigType"
          label="Rig"
          required="Say how it is rigged."
          choices={RIG_TYPES.map((value) => ({ value, label: RIG_TYPE_WORDS[value] }))}
        />
        <ChoiceField
          name="useKind"
          label="Use"
          required="Say what it is used for."
          choices={USE_KINDS.map((value) => ({ value, label: USE_KIND_WORDS[value] }))}
        />
      </FieldPair>
      <FieldPair>
        <NumberField
          name="buildYear"
          label="Build year"
          whole
          hint="Calendar rules of parts without a fitted date run from here."
        />
        <NumberField name="lengthM" label="Length overall" unit={format.lengthUnit} />
      </FieldPair>
      <TextField name="homePort" label="Home port" maxLength={120} />
      <ChoiceField
        name="zone"
        label="Time zone"
        required="Choose the zone the vessel keeps."
        searchable
        hint="Days of the recordings and due dates are days of this zone."
        choices={zoneChoices(vessel?.zone)}
      />
      {!vessel && firms.length > 1 ? (
        <ChoiceField name="firmId" label="Looked after by" required="Choose the firm." choices={firms} />
      ) : null}
      <TextField name="notes" label="Notes" lines={3} maxLength={4000} />
    </ContractFormSheet>
  );
}

function useFirmsLookingAfter() {
  const { roles } = useSession();
  const firms = new Map<string, string>();
  for (const { role, firmId, firmName } of roles) {
    if ((role === 'surveyor' || role === 'rigger') && firmId) firms.set(firmId, firmName ?? firmId);
  }
  return [...firms].map(([value, label]) => ({ value, label }));
}

/** Every zone this browser knows, and the vessel's own where it does not. */
function zoneChoices(own: string | undefined) {
  const zones = new Set([...Intl.supportedValuesOf('timeZone'), 'UTC', browserZone(), ...(own ? [own] : [])]);
  return [...zones].sort().map((zone) => ({ value: zone, label: zone.replaceAll('_', ' ') }));
}
