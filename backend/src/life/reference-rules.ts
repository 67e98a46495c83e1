import { readFileSync } from 'node:fs';
import {
  materialsFileSchema,
  replacementRulesFileSchema,
  threadsFileSchema,
} from '@stayledger/shared/contracts/constructions';
import type { ReplacementRule } from '@stayledger/shared/fatigue/life/replacement-rule';
import type { ThreadSize } from '@stayledger/shared/rig/part-detail';

let rules: Map<string, ReplacementRule> | undefined;
let materials: Set<string> | undefined;
let threads: Map<string, ThreadSize> | undefined;

/** A calendar rule of the trade by the key a construction names; undefined when the table has none. */
export function replacementRule(id: string): ReplacementRule | undefined {
  rules ??= new Map(
    replacementRulesFileSchema
      .parse(readJson(require.resolve('@stayledger/reference-data/replacement-rules.json')))
      .rules.map((rule) => [rule.id, rule]),
  );
  return rules.get(id);
}

/** Whether the table of materials knows the key. */
export function isMaterial(id: string): boolean {
  materials ??= new Set(
    materialsFileSchema
      .parse(readJson(require.resolve('@stayledger/reference-data/materials.json')))
      .materials.map((material) => material.id),
  );
  return materials.has(id);
}

/** A thread by its designation ("M12", "1/2-20 UNF"); undefined when the table does not know it. */
export function threadSize(designation: string): ThreadSize | undefined {
  threads ??= new Map(
    threadsFileSchema
      .parse(readJson(require.resolve('@stayledger/reference-data/threads.json')))
      .threads.map((thread) => [keyOf(thread.designation), thread]),
  );
  return threads.get(keyOf(designation));
}

/** People write "M 12", "m12" and "M12x1,75"; spaces, case and the decimal sign do not tell sizes apart. */
function keyOf(designation: string): string {
  return designation.toLowerCase().replace(/\s+/g, '').replace(/×/g, 'x').replace(/,/g, '.');
}

function readJson(path: string): unknown {
  return JSON.parse(readFileSync(path, 'utf8'));
}
