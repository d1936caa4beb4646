import { collaborationRoute } from '@/app/api/v1/handler';
import { limitAsJson, limitAsLatex, limitAsText } from '@/lib/inference/statement-forms';
import { type StatementQuery, statementQuerySchema } from '@/lib/schemas/statement';
import { getRunStatement } from '@/lib/services/run-statement';

const forms = {
  json: { type: 'application/json', write: limitAsJson },
  text: { type: 'text/plain; charset=utf-8', write: limitAsText },
  latex: { type: 'application/x-latex; charset=utf-8', write: limitAsLatex },
};

/** The first form that the Accept header names; JSON where it names none of them. */
function formOf(accept: string | null): keyof typeof forms {
  const wanted = (accept ?? '').split(',').map((part) => part.split(';')[0].trim());
  const found = wanted.find((type) =>
    ['application/json', 'text/plain', 'application/x-latex'].includes(type),
  );
  if (found === 'text/plain') return 'text';
  return found === 'application/x-latex' ? 'latex' : 'json';
}

/** One recorded limit as a sentence with its conditions: text, LaTeX or JSON. */
export const GET = collaborationRoute<undefined, StatementQuery>(
  { scope: 'read', query: statementQuerySchema },
  async ({ actor, params, query: { as, ...choice }, request }) => {
    const { type, write } = forms[as ?? formOf(request.headers.get('accept'))];
    const text = write(await getRunStatement(actor, params.run, choice));
    return new Response(text, { headers: { 'Content-Type': type, Vary: 'Accept' } });
  },
);
