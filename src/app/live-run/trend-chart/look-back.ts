/** Movement before a press becomes a drag [px]: a shaky finger is no drag. */
const DRAG_FROM_PX = 5;

/** What looking back needs to know and to change. */
export interface LookBack {
  /** Seconds that one pixel stands for. */
  readonly secondsPerPx: () => number;
  /** End of the window now [s]. */
  readonly endS: () => number;
  readonly moveTo: (endS: number) => void;
}

/** Drags and scrolls a trend along its time: to the right is back in time. Returns how to stop. */
export function listenForLookBack(element: HTMLElement, look: LookBack): () => void {
  let began: {readonly x: number; readonly endS: number} | null = null;
  let isDragging = false;

  const press = (event: PointerEvent): void => {
    if (event.button !== 0) return;
    began = {x: event.clientX, endS: look.endS()};
    isDragging = false;
  };
  const move = (event: PointerEvent): void => {
    if (began === null) return;
    const movedPx = event.clientX - began.x;
    if (!isDragging && Math.abs(movedPx) < DRAG_FROM_PX) return;
    if (!isDragging) element.setPointerCapture(event.pointerId);
    isDragging = true;
    look.moveTo(began.endS - movedPx * look.secondsPerPx());
  };
  const release = (): void => {
    began = null;
    isDragging = false;
  };
  const scroll = (event: WheelEvent): void => {
    const alongPx = event.shiftKey ? event.deltaY : event.deltaX;
    if (Math.abs(alongPx) < Math.abs(event.shiftKey ? 0 : event.deltaY) || alongPx === 0) return;
    event.preventDefault(); // else the browser would leave the page
    look.moveTo(look.endS() + alongPx * look.secondsPerPx());
  };

  element.addEventListener('pointerdown', press);
  element.addEventListener('pointermove', move);
  element.addEventListener('pointerup', release);
  element.addEventListener('pointercancel', release);
  element.addEventListener('wheel', scroll, {passive: false});
  return () => {
    element.removeEventListener('pointerdown', press);
    element.removeEventListener('pointermove', move);
    element.removeEventListener('pointerup', release);
    element.removeEventListener('pointercancel', release);
    element.removeEventListener('wheel', scroll);
  };
}
