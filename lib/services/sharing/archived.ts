import { Op } from 'sequelize';

/** Surveys in use: not archived, or shared and to be withdrawn on a day that has not come. */
export const notArchived = () => ({
  archivedAt: { [Op.or]: [{ [Op.is]: null }, { [Op.gt]: new Date() }] },
});

/** Surveys whose owners, where they are others, have not taken them back. */
export const notWithdrawn = () => ({
  [Op.or]: [{ shareId: { [Op.is]: null } }, notArchived()],
});
