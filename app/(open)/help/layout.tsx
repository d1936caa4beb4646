import type { ReactNode } from 'react';
import { HelpFrame } from '@/components/help/help-frame';

export default function HelpLayout({ children }: { children: ReactNode }) {
  return <HelpFrame>{children}</HelpFrame>;
}
