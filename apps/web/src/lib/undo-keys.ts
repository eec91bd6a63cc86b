const isText = (target: EventTarget | null): boolean =>
  target instanceof HTMLTextAreaElement || (target instanceof HTMLInputElement && !['radio', 'checkbox'].includes(target.type));

/** The keys by which people everywhere take back their last change, and do it again; within a text field they belong to the text. */
export function findStep(event: KeyboardEvent): 'undo' | 'redo' | undefined {
  if (!(event.ctrlKey || event.metaKey) || event.altKey || event.key.toLowerCase() !== 'z' || isText(event.target)) return undefined;
  return event.shiftKey ? 'redo' : 'undo';
}
