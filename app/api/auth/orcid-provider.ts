import type { OAuthConfig } from 'next-auth/providers/oauth';
import type { OrcidSettings } from '@/lib/config';

const LONGEST_WAIT_MS = 10_000;

/** To sign in, or to link the iD to the account that is signed in: two intents, told apart by name. */
export type OrcidProviderId = 'orcid' | 'orcid-link';

/**
 * ORCID as next-auth knows a provider: authorization code, state and PKCE. The iD comes with the
 * token, from the provider's own address; the browser never carries it.
 */
export function orcidProvider(
  id: OrcidProviderId,
  { issuer, clientId, clientSecret }: OrcidSettings,
): OAuthConfig<{ sub?: string }> {
  return {
    id,
    name: 'ORCID',
    type: 'oauth',
    issuer,
    clientId,
    clientSecret,
    authorization: { url: `${issuer}/oauth/authorize`, params: { scope: '/authenticate' } },
    token: `${issuer}/oauth/token`,
    userinfo: { request: async ({ tokens }) => ({ sub: String(tokens.orcid ?? '') }) },
    client: { token_endpoint_auth_method: 'client_secret_post' },
    checks: ['state', 'pkce'],
    httpOptions: { timeout: LONGEST_WAIT_MS },
    // Only the iD counts; whose account it opens is decided in the callback.
    profile: ({ sub }) => ({ id: sub || 'none', name: '', email: '', sessionId: '' }),
  };
}
