'use client';

import { TopBar } from '@/components/shell/top-bar';
import { Menu } from '@/components/ui/menu';
import type { Kernel } from '@/lib/graph';
import { EditorSurface } from '../editor-surface';
import { exportApi, type KernelPlaces, kernelPath, type VersionSummary } from '../server-calls';
import { EditorProvider } from '../store/editor-context';

interface VersionViewProps {
  places: KernelPlaces;
  version: VersionSummary;
  document: Kernel;
}

/** One kept version, to look at. */
export function VersionView({ places, version, document }: VersionViewProps) {
  const title = `Version ${version.number}${version.label ? ` · ${version.label}` : ''}`;
  return (
    <EditorProvider kernel={document} readOnly>
      <EditorSurface
        top={
          <TopBar
            path={[
              { label: 'Kernels', href: `/w/${places.workspace}/kernels` },
              { label: document.name, href: kernelPath(places) },
              { label: title },
            ]}
            status={`kept by ${version.createdByName}, never changes`}
            actions={
              <Menu
                label="File"
                items={[
                  { id: 'json', label: 'Export as JSON', href: exportApi(places, 'json', version.number) },
                  { id: 'dot', label: 'Export as DOT', href: exportApi(places, 'dot', version.number) },
                ]}
              />
            }
          />
        }
      />
    </EditorProvider>
  );
}
