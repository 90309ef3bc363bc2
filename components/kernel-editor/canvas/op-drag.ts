/** What a palette entry carries while it is dragged: the op's kind. */
export const OP_DRAG_TYPE = 'application/x-pinloom-op';
