import { helpWordNames, isHelpWord } from '@/lib/help';
import { helpDefinition } from '@/lib/help/definition';

/** Made once when the product is built: the words are part of it. */
export const dynamic = 'force-static';
export const dynamicParams = false;
export const generateStaticParams = () => helpWordNames.map((word) => ({ word }));

/** A word's definition, as the marks beside quantities read it. */
export async function GET(_request: Request, { params }: { params: Promise<{ word: string }> }) {
  const { word } = await params;
  if (!isHelpWord(word)) return Response.json({ title: 'Not found', status: 404 }, { status: 404 });
  return Response.json(helpDefinition(word));
}
