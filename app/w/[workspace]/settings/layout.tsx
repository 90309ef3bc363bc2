import type { ReactNode } from 'react';
import { SettingsTabs } from './settings-tabs';

interface SettingsLayoutProps {
  params: Promise<{ workspace: string }>;
  children: ReactNode;
}

export default async function SettingsLayout({ params, children }: SettingsLayoutProps) {
  return (
    <>
      <SettingsTabs workspaceSlug={(await params).workspace} />
      {children}
    </>
  );
}
