import { z } from 'zod';

/**
 * A calculator's settings schema as a list of form fields: the one place that looks into a schema, so that the
 * form on the screen, the help page and a setup's diff show the same labels, units and ranges.
 */
interface FieldBase {
  readonly path: readonly string[]; // ['air', 'temperature']
  readonly label: string;
  readonly help: string;
  readonly heading: string; // of the part of the form it stands in, '' for none
  readonly required: boolean;
}
export interface NumberSetting extends FieldBase {
  readonly kind: 'number';
  readonly unit: string; // SI, '' for a pure number
  readonly isInteger: boolean;
  readonly least: number | null;
  readonly most: number | null;
  readonly preset: number | null; // the schema's default
}
export interface ChoiceSetting extends FieldBase {
  readonly kind: 'choice';
  readonly options: readonly string[];
  readonly preset: string | null;
}
export interface ToggleSetting extends FieldBase {
  readonly kind: 'toggle';
  readonly preset: boolean;
}
export interface TextSetting extends FieldBase {
  readonly kind: 'text';
  readonly preset: string | null;
}
/** Two numbers of one unit, low and high: a band. */
export interface RangeSetting extends FieldBase {
  readonly kind: 'range';
  readonly unit: string;
}
export interface GroupSetting extends FieldBase {
  readonly kind: 'group';
  readonly fields: readonly SettingsField[];
}
/** One of several groups: air by temperature and pressure, or by density and speed of sound. */
export interface AlternativesSetting extends FieldBase {
  readonly kind: 'alternatives';
  readonly alternatives: readonly GroupSetting[];
}
export type SettingsField =
  | NumberSetting
  | ChoiceSetting
  | ToggleSetting
  | TextSetting
  | RangeSetting
  | GroupSetting
  | AlternativesSetting;

interface JsonNode {
  type?: string;
  label?: string;
  help?: string;
  group?: string;
  unit?: string;
  default?: unknown;
  enum?: readonly unknown[];
  minimum?: number;
  exclusiveMinimum?: number;
  maximum?: number;
  exclusiveMaximum?: number;
  properties?: Record<string, JsonNode>;
  required?: readonly string[];
  anyOf?: readonly JsonNode[];
  prefixItems?: readonly JsonNode[];
}

/** The fields of an object schema, in the order they are declared. Kinds that no form can show are left out. */
export function settingsFields(schema: z.ZodType): readonly SettingsField[] {
  const root: JsonNode = JSON.parse(JSON.stringify(z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' })));
  return fieldsOf(root, []);
}

function fieldsOf(node: JsonNode, path: readonly string[]): SettingsField[] {
  const required = new Set(node.required ?? []);
  return Object.entries(node.properties ?? {}).flatMap(([name, child]) => {
    const field = fieldOf(child, [...path, name], required.has(name));
    return field ? [field] : [];
  });
}

function fieldOf(node: JsonNode, path: readonly string[], required: boolean): SettingsField | null {
  const base: FieldBase = {
    path,
    label: node.label ?? path.at(-1) ?? '',
    help: node.help ?? '',
    heading: node.group ?? '',
    required,
  };
  if (node.enum) {
    return { ...base, kind: 'choice', options: node.enum.map(String), preset: textOrNull(node.default) };
  }
  switch (node.type) {
    case 'number':
    case 'integer':
      return numberField(node, base);
    case 'boolean':
      return { ...base, kind: 'toggle', preset: node.default === true };
    case 'string':
      return { ...base, kind: 'text', preset: textOrNull(node.default) };
    case 'array':
      return node.prefixItems?.length === 2 ? { ...base, kind: 'range', unit: node.unit ?? '' } : null;
    case 'object':
      return node.properties ? { ...base, kind: 'group', fields: fieldsOf(node, path) } : null;
    default:
      return alternativesField(node, base);
  }
}

function numberField(node: JsonNode, base: FieldBase): NumberSetting {
  return {
    ...base,
    kind: 'number',
    unit: node.unit ?? '',
    isInteger: node.type === 'integer',
    least: node.minimum ?? node.exclusiveMinimum ?? null,
    most: node.maximum ?? node.exclusiveMaximum ?? null,
    preset: typeof node.default === 'number' ? node.default : null,
  };
}

function alternativesField(node: JsonNode, base: FieldBase): SettingsField | null {
  const groups = (node.anyOf ?? []).flatMap((option) => {
    const field = fieldOf({ label: base.label, ...option }, base.path, false);
    return field?.kind === 'group' ? [field] : [];
  });
  if (groups.length === 0) return null;
  return groups.length === 1 && groups[0]
    ? { ...groups[0], ...base }
    : { ...base, kind: 'alternatives', alternatives: groups };
}

function textOrNull(value: unknown): string | null {
  return typeof value === 'string' ? value : null;
}
