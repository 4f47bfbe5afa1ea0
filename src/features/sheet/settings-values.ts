/** Settings as a card stores them: only what differs from the defaults, groups nested. */
export type SettingsValues = Readonly<Record<string, unknown>>;

function isGroup(value: unknown): value is SettingsValues {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

export function settingAt(values: SettingsValues, path: readonly string[]): unknown {
  return path.reduce<unknown>((at, name) => (isGroup(at) ? at[name] : undefined), values);
}

/** The same settings with one changed. `undefined` takes it out, and a group that has nothing left goes with it. */
export function withSetting(values: SettingsValues, path: readonly string[], value: unknown): SettingsValues {
  const [name, ...rest] = path;
  if (name === undefined) return values;
  const { [name]: before, ...others } = values;
  if (rest.length === 0) return value === undefined ? others : { ...others, [name]: value };
  const inner = withSetting(isGroup(before) ? before : {}, rest, value);
  return Object.keys(inner).length === 0 ? others : { ...others, [name]: inner };
}
