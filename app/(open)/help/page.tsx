import type { Metadata } from 'next';
import { HelpContents } from '@/components/help/help-contents';
import { PageTitle } from '@/components/ui/page-title';

export const metadata: Metadata = { title: 'Help' };

export default function HelpPage() {
  return (
    <>
      <PageTitle
        title="Help"
        context="Each word and each quantity: what it means, its formula, its source"
      />
      <HelpContents />
    </>
  );
}
