import { UniqueConstraintError } from 'sequelize';
import type { KnownPerson } from '@/lib/access/actor';
import { Conflict } from '@/lib/errors';
import { inTransaction, PersonRow } from '@/models';
import { recordAudit } from './audit';

/** The person's own iD, or null. */
export async function readOwnOrcid(person: Pick<KnownPerson, 'personId'>): Promise<string | null> {
  const row = await PersonRow.findByPk(person.personId, { attributes: ['orcid'] });
  return row?.orcid ?? null;
}

/**
 * Ties an iD that ORCID has confirmed to the account of whoever is signed in; an earlier one goes.
 *
 * @throws Conflict when the iD belongs to another account
 */
export async function linkOrcid(person: KnownPerson, orcid: string): Promise<void> {
  try {
    await inTransaction(async (transaction) => {
      const where = { id: person.personId };
      const [row] = await PersonRow.findAll({ where, lock: transaction.LOCK.UPDATE, transaction });
      const before = row?.orcid ?? null;
      if (before === orcid) return;
      await PersonRow.update({ orcid }, { where, transaction });
      const item = { kind: 'person', id: person.personId };
      const details = { before, after: orcid };
      await recordAudit(person, 'link-orcid', item, 'linked an ORCID iD', transaction, details);
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw new Conflict('Another account is linked with this iD', 'orcid-taken');
    }
    throw error;
  }
}

/** Takes the iD off the account, which is entered by its password as before. */
export async function unlinkOrcid(person: KnownPerson): Promise<void> {
  await inTransaction(async (transaction) => {
    const before = await readOwnOrcid(person);
    if (before === null) return;
    await PersonRow.update({ orcid: null }, { where: { id: person.personId }, transaction });
    const item = { kind: 'person', id: person.personId };
    const details = { before, after: null };
    await recordAudit(person, 'unlink-orcid', item, 'unlinked an ORCID iD', transaction, details);
  });
}
