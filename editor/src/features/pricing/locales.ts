import { formatMoney } from '@lampwright/geometry/price';

const common = [
  'en-US',
  'en-CA',
  'fr-CA',
  'en-GB',
  'en-IE',
  'en-AU',
  'en-NZ',
  'de-DE',
  'de-AT',
  'de-CH',
  'fr-FR',
  'nl-NL',
  'it-IT',
  'es-ES',
  'pt-PT',
  'da-DK',
  'sv-SE',
  'nb-NO',
  'fi-FI',
  'pl-PL',
] as const;

/** Manners of writing money to choose from, each with an example; the present one is always among them. */
export function localesWith(present: string, currency: string): { value: string; label: string }[] {
  const names = new Intl.DisplayNames('en', { type: 'language' });
  const nameOf = (locale: string): string => {
    try {
      return names.of(locale) ?? locale;
    } catch {
      return locale;
    }
  };
  return [...new Set<string>([present, ...common])]
    .map((value) => ({ value, label: `${nameOf(value)}: ${formatMoney(123_450, currency, value)}` }))
    .sort((a, b) => a.label.localeCompare(b.label));
}
