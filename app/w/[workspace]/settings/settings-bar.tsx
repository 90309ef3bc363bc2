import type { ReactNode } from 'react';
import { TopBar } from '@/components/shell/top-bar';
import { SettingsTabs } from './settings-tabs';

interface SettingsBarProps {
  workspaceSlug: string;
  title: string;
  actions?: ReactNode;
}

/** The top of every settings page: where one is, and the way to the other settings. */
export function SettingsBar({ workspaceSlug, title, actions }: SettingsBarProps) {
  return (
    <>
      <TopBar path={[{ label: 'Settings' }, { label: title }]} actions={actions} />
      <SettingsTabs workspaceSlug={workspaceSlug} />
    </>
  );
}
