import { redirect } from 'next/navigation';

export default async function SettingsPage({ params }: { params: Promise<{ workspace: string }> }) {
  redirect(`/w/${(await params).workspace}/settings/account`);
}
