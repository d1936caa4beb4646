import { z } from 'zod';
import { combinationRuleSchema } from './combinations';
import { levelSchema, lineSchema, moment, slugSchema } from './common';

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}

export const timeZoneSchema = z
  .string()
  .max(60)
  .refine(isTimeZone, 'a name of the IANA list, such as Europe/Vienna');

/** What owners settle for a collaboration; each rules what its members see or begin with. */
export const settingsSchema = z.object({
  name: z.string(),
  slug: z.string(),
  /** The rule for a star in several surveys that new analyses and combinations begin with. */
  combination: combinationRuleSchema,
  /** The credible level that new analyses begin with. */
  credibleLevel: z.number(),
  /** Of the dates on pages; files and the API keep UTC. */
  timeZone: z.string(),
  /** Key of the analysis that the overview shows; null: the one with the newest run. */
  leadAnalysis: z.string().nullable(),
  /** Whether somebody else than who froze a run must agree to its release. */
  needsTwoPeople: z.boolean(),
  /** Null until somebody decides: then it is on as soon as two people could agree. */
  needsTwoPeopleChosen: z.boolean().nullable(),
  archivedAt: moment.nullable(),
  can: z.object({ manage: z.boolean() }),
});
export type SettingsView = z.infer<typeof settingsSchema>;

export const changeSettingsSchema = z.strictObject({
  name: lineSchema(100).optional(),
  slug: slugSchema.min(2).optional(),
  combination: combinationRuleSchema.optional(),
  credibleLevel: levelSchema.optional(),
  timeZone: timeZoneSchema.optional(),
  leadAnalysis: z
    .string()
    .regex(/^A-[1-9][0-9]{0,8}$/, 'a key such as A-31')
    .nullable()
    .optional(),
  needsTwoPeople: z.boolean().nullable().optional(),
  isArchived: z.boolean().optional(),
});
export type ChangeSettings = z.infer<typeof changeSettingsSchema>;
