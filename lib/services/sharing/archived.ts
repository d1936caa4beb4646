import { Op } from 'sequelize';
import type { SurveyRow } from '@/models';

/** Surveys in use: not archived, or shared and to be withdrawn on a day that has not come. */
export const notArchived = () => ({
  archivedAt: { [Op.or]: [{ [Op.is]: null }, { [Op.gt]: new Date() }] },
});

/** The opposite of `notArchived`, of a row that was read. */
export const isArchived = ({ archivedAt }: Pick<SurveyRow, 'archivedAt'>) =>
  archivedAt !== null && archivedAt <= new Date();

/** Surveys whose owners, where they are others, have not taken them back. */
export const notWithdrawn = () => ({
  [Op.or]: [{ shareId: { [Op.is]: null } }, notArchived()],
});
