import type { Metadata } from 'next';
import { requireMember } from '@/app/_server/access';
import { NewFabric } from '@/components/fabric-form/new-fabric';
import { TopBar } from '@/components/shell/top-bar';
import { createFabricAction } from '../actions';

export const metadata: Metadata = { title: 'New fabric' };

export default async function NewFabricPage({ params }: { params: Promise<{ workspace: string }> }) {
  const { workspace: slug } = await params;
  await requireMember(slug, 'editor');
  return (
    <>
      <TopBar path={[{ label: 'Fabrics', href: `/w/${slug}/fabrics` }, { label: 'New fabric' }]} />
      <div className="p-4">
        <NewFabric workspace={slug} create={createFabricAction} />
      </div>
    </>
  );
}
