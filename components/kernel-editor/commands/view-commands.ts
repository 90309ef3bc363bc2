import { always, type Command, someOps } from './command';

export const zoomInCommand: Command = {
  id: 'zoomIn',
  label: 'Zoom in',
  group: 'View',
  shortcuts: ['+', '='],
  writes: false,
  enabled: always,
  run: ({ canvas }) => canvas?.zoomIn(),
};

export const zoomOutCommand: Command = {
  id: 'zoomOut',
  label: 'Zoom out',
  group: 'View',
  shortcuts: ['-'],
  writes: false,
  enabled: always,
  run: ({ canvas }) => canvas?.zoomOut(),
};

export const fitCommand: Command = {
  id: 'fit',
  label: 'Show all',
  group: 'View',
  shortcuts: ['F'],
  writes: false,
  enabled: someOps,
  run: ({ canvas }) => canvas?.fit(),
};

export const dragModeCommand: Command = {
  id: 'dragMode',
  label: 'Switch what a drag on the canvas does: select or move the view',
  group: 'View',
  shortcuts: ['H'],
  writes: false,
  enabled: always,
  run: ({ state }) => {
    const next = state.dragMode === 'select' ? 'pan' : 'select';
    state.setDragMode(next);
    state.say(next === 'pan' ? 'A drag now moves the view' : 'A drag now selects');
  },
};

export const paletteCommand: Command = {
  id: 'palette',
  label: 'Search the operations to add',
  group: 'View',
  shortcuts: ['/'],
  writes: true,
  enabled: always,
  run: ({ focusPalette }) => focusPalette(),
};

export const shortcutsCommand: Command = {
  id: 'shortcuts',
  label: 'Keyboard shortcuts',
  group: 'Help',
  shortcuts: ['?'],
  writes: false,
  enabled: always,
  run: ({ state }) => state.openDialog('shortcuts'),
};
