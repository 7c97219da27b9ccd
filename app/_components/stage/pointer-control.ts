import type { StageControl } from './stage-control';

export interface PointerEvents {
  /** the pointer rests over a place of the canvas, or has left it (null) */
  onHover(place: [number, number] | null): void;
  /** a press without a drag */
  onPress(place: [number, number]): void;
}

const DEG_PER_PX = 0.4;
const PRESS_PX = 5;

/**
 * Mouse: drag turns, drag with Shift or the right button shifts, the wheel zooms once the stage has the focus (before
 * that it scrolls the page). Touch: across turns, two fingers shift and zoom, up and down scrolls the page until the
 * stage has the focus. Returns a function that takes the listeners off.
 */
export function attachPointers(host: HTMLElement, control: StageControl, events: PointerEvents): () => void {
  const down = new Map<number, { x: number; y: number }>();
  let travelled = 0;
  let shifting = false;
  let hover: [number, number] | null = null;
  let hoverFrame = 0;

  const place = (event: PointerEvent | WheelEvent): [number, number] => {
    const box = host.getBoundingClientRect();
    return [event.clientX - box.left, event.clientY - box.top];
  };
  const hasFocus = () => host.contains(document.activeElement);
  const touchAction = () => {
    host.style.touchAction = hasFocus() ? 'none' : 'pan-y';
  };

  const onDown = (event: PointerEvent) => {
    if (event.target !== host && !(event.target instanceof HTMLCanvasElement)) return;
    down.set(event.pointerId, { x: event.clientX, y: event.clientY });
    host.setPointerCapture(event.pointerId);
    if (down.size === 1) travelled = 0;
    shifting = event.shiftKey || event.button === 2 || event.button === 1;
    if (event.button === 1) event.preventDefault();
  };

  const onMove = (event: PointerEvent) => {
    const last = down.get(event.pointerId);
    if (!last) {
      if (event.pointerType !== 'touch') showHover(place(event));
      return;
    }
    const [dx, dy] = [event.clientX - last.x, event.clientY - last.y];
    travelled += Math.hypot(dx, dy);
    if (down.size === 2) pinch(event, dx, dy);
    else if (travelled > PRESS_PX) {
      if (shifting) control.panByPixels(dx, dy);
      else control.turnBy(-dx * DEG_PER_PX, dy * DEG_PER_PX);
    }
    down.set(event.pointerId, { x: event.clientX, y: event.clientY });
  };

  const pinch = (event: PointerEvent, dx: number, dy: number) => {
    const other = [...down].find(([id]) => id !== event.pointerId)![1];
    const last = down.get(event.pointerId)!;
    const before = Math.hypot(last.x - other.x, last.y - other.y);
    const after = Math.hypot(event.clientX - other.x, event.clientY - other.y);
    const box = host.getBoundingClientRect();
    control.panByPixels(dx / 2, dy / 2);
    if (before > 0 && after > 0) {
      control.zoomBy(
        after / before,
        (event.clientX + other.x) / 2 - box.left,
        (event.clientY + other.y) / 2 - box.top,
      );
    }
  };

  const onUp = (event: PointerEvent) => {
    const was = down.size;
    if (!down.delete(event.pointerId)) return;
    if (event.type === 'pointerup' && was === 1 && travelled <= PRESS_PX && event.button === 0) {
      events.onPress(place(event));
    }
  };

  const showHover = (at: [number, number] | null) => {
    hover = at;
    // One look at the surface a frame, however fast the pointer reports.
    if (hoverFrame === 0) {
      hoverFrame = requestAnimationFrame(() => {
        hoverFrame = 0;
        events.onHover(hover);
      });
    }
  };

  const onWheel = (event: WheelEvent) => {
    if (!hasFocus() && !event.ctrlKey) return;
    event.preventDefault();
    const lines = event.deltaMode === 1 ? 16 : 1;
    control.zoomBy(Math.exp((-event.deltaY * lines) / 480), ...place(event));
  };
  const onLeave = () => showHover(null);
  const onMenu = (event: Event) => event.preventDefault();

  const off: (() => void)[] = [];
  const on = <K extends keyof HTMLElementEventMap>(
    type: K,
    listener: (event: HTMLElementEventMap[K]) => void,
    options?: AddEventListenerOptions,
  ) => {
    host.addEventListener(type, listener, options);
    off.push(() => host.removeEventListener(type, listener, options));
  };
  on('pointerdown', onDown);
  on('pointermove', onMove);
  on('pointerup', onUp);
  on('pointercancel', onUp);
  on('pointerleave', onLeave);
  on('wheel', onWheel, { passive: false });
  on('contextmenu', onMenu);
  on('focus', touchAction);
  on('blur', touchAction);
  touchAction();
  return () => {
    cancelAnimationFrame(hoverFrame);
    off.forEach((take) => take());
  };
}
