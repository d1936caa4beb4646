import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { HelpEntryPage } from '@/components/help/help-entry';
import { helpWords, isHelpWord } from '@/lib/help';

type Params = { params: Promise<{ word: string }> };

export async function generateMetadata({ params }: Params): Promise<Metadata> {
  const { word } = await params;
  return { title: isHelpWord(word) ? `${helpWords[word].title}, help` : 'Help' };
}

export default async function HelpWordPage({ params }: Params) {
  const { word } = await params;
  if (!isHelpWord(word)) notFound();
  return <HelpEntryPage word={word} />;
}
