/** Rigs a vessel can start from. */
export const RIG_TEMPLATE_KEYS = [
  'masthead-sloop',
  'fractional-sloop',
  'cutter',
  'ketch',
  'yawl',
  'schooner',
  'unstayed-mizzen',
] as const;
export type RigTemplateKey = (typeof RIG_TEMPLATE_KEYS)[number];

/** The template in a person's words. */
export const RIG_TEMPLATE_NAMES: Readonly<Record<RigTemplateKey, string>> = {
  'masthead-sloop': 'Masthead sloop',
  'fractional-sloop': 'Fractional sloop',
  cutter: 'Cutter with a bowsprit',
  ketch: 'Ketch',
  yawl: 'Yawl',
  schooner: 'Two-masted schooner',
  'unstayed-mizzen': 'Sloop with an unstayed mizzen',
};

/**
 * The template that suits a vessel's stated rig type.
 *
 * @returns 'masthead-sloop' for a type without a template of its own
 */
export function templateForRigType(rigType: string): RigTemplateKey {
  return RIG_TEMPLATE_KEYS.find((key) => key === rigType) ?? 'masthead-sloop';
}
