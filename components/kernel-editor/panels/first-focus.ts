/** A ref that marks what a dialog focuses when it opens: the platform looks for this attribute, which React keeps back. */
export const firstFocus = (element: HTMLElement | null): void => element?.setAttribute('autofocus', '');
