import type { ReactNode } from 'react';
import { currentCollaborations } from '@/app/session';
import { HelpFrame } from '@/components/help/help-frame';

export default async function HelpLayout({ children }: { children: ReactNode }) {
  return <HelpFrame collaborations={await currentCollaborations()}>{children}</HelpFrame>;
}
