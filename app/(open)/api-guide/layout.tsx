import type { ReactNode } from 'react';
import { HelpFrame } from '@/components/help/help-frame';

export default function ApiGuideLayout({ children }: { children: ReactNode }) {
  return <HelpFrame>{children}</HelpFrame>;
}
