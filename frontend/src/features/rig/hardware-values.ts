import type { PartHardware } from '@stayledger/shared/contracts/parts';
import { figureOf } from '../../components/forms/fields';

export const HARDWARE_ELEMENTS = ['turnbuckle', 'toggle', 'pin', 'chainplate'] as const;
type Element = (typeof HARDWARE_ELEMENTS)[number];
type Articulation = NonNullable<PartHardware['upperArticulation']>;

/** The hardware as a form holds it. */
export type HardwareValues = Record<Element, { there: 'yes' | 'no'; load: string }> & {
  upperArticulation?: Articulation;
  lowerArticulation?: Articulation;
};

export function hardwareValues(
  hardware: PartHardware | null,
  loadText: (kn: number) => string,
): HardwareValues {
  const element = (key: Element): HardwareValues[Element] => {
    const stored = hardware?.[key];
    return {
      there: stored?.there === false ? 'no' : 'yes',
      load: stored?.breakingLoadKn ? loadText(stored.breakingLoadKn) : '',
    };
  };
  return {
    turnbuckle: element('turnbuckle'),
    toggle: element('toggle'),
    pin: element('pin'),
    chainplate: element('chainplate'),
    upperArticulation: hardware?.upperArticulation ?? undefined,
    lowerArticulation: hardware?.lowerArticulation ?? undefined,
  };
}

/** null where nothing was said: all of it is then there and of unknown strength. */
export function hardwareOf(values: HardwareValues, toKn: (value: number) => number): PartHardware | null {
  const element = ({ there, load }: HardwareValues[Element]) => {
    const figure = there === 'yes' ? figureOf(load) : null;
    return { there: there === 'yes', breakingLoadKn: figure === null ? null : toKn(figure) };
  };
  const hardware: PartHardware = {
    turnbuckle: element(values.turnbuckle),
    toggle: element(values.toggle),
    pin: element(values.pin),
    chainplate: element(values.chainplate),
    upperArticulation: values.upperArticulation ?? null,
    lowerArticulation: values.lowerArticulation ?? null,
  };
  const silent =
    HARDWARE_ELEMENTS.every((key) => hardware[key].there && hardware[key].breakingLoadKn === null) &&
    hardware.upperArticulation === null &&
    hardware.lowerArticulation === null;
  return silent ? null : hardware;
}
