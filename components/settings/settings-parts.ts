import type { SettingsPart } from '@/components/hooks/use-settings';
import type { CombinationRule } from '@/lib/schemas/combinations';
import type { ChangeSettings, SettingsView } from '@/lib/schemas/settings';

export const ruleLabels: Record<CombinationRule, string> = {
  default: 'same position where curves allow it, else deepest',
  'same-position': 'same position: no movement between the epochs',
  deepest: 'the deepest map',
  independent: 'independent: each survey is a new chance',
  refuse: 'refuse: no star may be in two surveys',
};

/** A change as the settings name what it changes. */
export function partOf(change: ChangeSettings): SettingsPart {
  const { needsTwoPeople, isArchived, ...same } = change;
  return {
    ...same,
    ...(needsTwoPeople !== undefined && { needsTwoPeopleChosen: needsTwoPeople }),
    ...(isArchived !== undefined && { archivedAt: isArchived ? '' : null }),
  };
}

/** What follows from the settings and no form edits. */
export const storedOf = ({ needsTwoPeople, can }: SettingsView) => ({ needsTwoPeople, can });

/** Differs where the form of rules begins with something else. */
export const rulesKey = (settings: SettingsView): string =>
  JSON.stringify([
    settings.leadAnalysis,
    settings.combination,
    settings.credibleLevel,
    settings.needsTwoPeopleChosen,
    settings.can.manage,
  ]);

const TWO = new Map([
  [null, 'as soon as two people could'],
  [true, 'always'],
  [false, 'never'],
]);

/** Those settings that a part has, by the labels of their fields. */
export function settingsWords(
  part: SettingsPart,
  dayOf: (at: string) => string,
): Record<string, string> {
  const { archivedAt, combination, credibleLevel, needsTwoPeopleChosen } = part;
  const words: Record<string, string | undefined> = {
    Name: part.name,
    Address: part.slug,
    'Time zone': part.timeZone,
    'Lead analysis': part.leadAnalysis === null ? 'the one with the newest run' : part.leadAnalysis,
    'A star in several surveys': combination && ruleLabels[combination],
    'Credible level':
      credibleLevel === undefined ? undefined : `${Number((100 * credibleLevel).toFixed(6))} %`,
    'A second person agrees to each release':
      needsTwoPeopleChosen === undefined ? undefined : TWO.get(needsTwoPeopleChosen),
    Archived:
      archivedAt === undefined
        ? undefined
        : archivedAt === null
          ? 'no'
          : archivedAt === ''
            ? 'yes'
            : `since ${dayOf(archivedAt)}`,
  };
  return Object.fromEntries(
    Object.entries(words).flatMap(([name, text]) => (text === undefined ? [] : [[name, text]])),
  );
}
