import { addressOf } from '@/lib/access/attempts';
import { knownPerson } from '@/lib/access/requests';
import { config } from '@/lib/config';
import { Conflict } from '@/lib/errors';
import { readOrcid } from '@/lib/schemas/orcid';
import { linkOrcid } from '@/lib/services/orcid';
import { type SignedIn, signInByOrcid } from '@/lib/services/sign-in';

type OrcidAnswer = { goTo: string } | { signedIn: SignedIn };

const refused = (error: string): OrcidAnswer => ({
  goTo: `${config().webAddress}/sign-in?error=${error}`,
});

/** Where the person was, on this site, with what became of the iD. */
function backTo(page: string | undefined, outcome: 'linked' | 'taken'): OrcidAnswer {
  const ours = new URL(config().webAddress);
  const isOurs = page !== undefined && URL.canParse(page) && new URL(page).origin === ours.origin;
  const address = isOurs ? new URL(page) : ours;
  address.searchParams.set('orcid', outcome);
  return { goTo: address.href };
}

/** Ties the iD to whoever is signed in; nobody is signed in by it. */
export async function linkByOrcid(
  confirmed: string,
  headers: Headers,
  page: string | undefined,
): Promise<OrcidAnswer> {
  const orcid = readOrcid(confirmed);
  if (orcid === null) return refused('OrcidDamaged');
  const cookie = headers.get('cookie') ?? '';
  const person = await knownPerson(new Request(config().webAddress, { headers: { cookie } }));
  if (!person) return refused('OrcidSignedOut');
  try {
    await linkOrcid({ ...person, address: addressOf(headers) }, orcid);
    return backTo(page, 'linked');
  } catch (error) {
    if (error instanceof Conflict) return backTo(page, 'taken');
    throw error;
  }
}

/** Signs in whoever has linked the iD before; an unknown one makes no account and opens none. */
export async function enterByOrcid(confirmed: string, headers: Headers): Promise<OrcidAnswer> {
  const orcid = readOrcid(confirmed);
  if (orcid === null) return refused('OrcidDamaged');
  const visitor = { address: addressOf(headers), userAgent: headers.get('user-agent') };
  const signedIn = await signInByOrcid(orcid, visitor);
  if (signedIn === null) return refused('OrcidUnknown');
  if ('link' in signedIn) return { goTo: `${config().webAddress}/sign-in/link/${signedIn.link}` };
  return { signedIn };
}
