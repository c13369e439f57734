/** Whether this browser knows a time zone of that name. */
export function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return name !== '';
  } catch {
    return false;
  }
}

/** All that this browser knows by name; its own alone where it can't list them. */
export function timeZoneNames(): readonly string[] {
  return typeof Intl.supportedValuesOf === 'function' ? Intl.supportedValuesOf('timeZone') : [ownTimeZone()];
}

const ownTimeZone = (): string => new Intl.DateTimeFormat().resolvedOptions().timeZone;
