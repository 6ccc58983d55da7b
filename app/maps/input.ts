import { mapsStore, resetMaps, setViewport } from './mapsStore.ts';
import type { PaneControl } from './paneControl.ts';
import { everything } from './viewport.ts';

/** A press that moves less than this, in CSS pixels, is a click. */
const stillness = 4;
const keyStep = { fine: 1, coarse: 10 };

/**
 * The hand on a map: wheel and pinch zoom, a drag pans, a click pins the crosshair, keys do all of it.
 * @returns takes the listeners off again
 */
export function listen(hand: HTMLElement, control: PaneControl, ask: () => void): () => void {
  const pointers = new Map<number, { x: number; y: number }>();
  let moved = 0;
  let box: DOMRect | null = null;
  let measured = 0;
  const share = (event: PointerEvent | WheelEvent | MouseEvent): { x: number; y: number } => {
    // measuring a page whose words have just changed lays it out anew: not more often than it can matter
    const now = performance.now();
    if (box === null || now - measured > 500 || event.type === 'pointerdown') {
      box = hand.getBoundingClientRect();
      measured = now;
    }
    return { x: (event.clientX - box.left) / box.width, y: (event.clientY - box.top) / box.height };
  };

  const wheel = (event: WheelEvent): void => {
    event.preventDefault();
    const { x, y } = share(event);
    const lines = event.deltaMode === WheelEvent.DOM_DELTA_LINE ? 20 : 1;
    // a pinch on a touch pad comes as a wheel with the control key, in much smaller steps
    const rate = event.ctrlKey ? 0.012 : 0.0022;
    control.zoom(Math.exp(-event.deltaY * lines * rate), x, y);
  };

  const down = (event: PointerEvent): void => {
    if (event.button !== 0) return;
    hand.setPointerCapture(event.pointerId);
    pointers.set(event.pointerId, share(event));
    if (pointers.size === 1) moved = 0;
  };

  const move = (event: PointerEvent): void => {
    const now = share(event);
    const before = pointers.get(event.pointerId);
    if (before === undefined) {
      if (!mapsStore.getState().pinned) control.point(control.positionAt(now.x, now.y), false);
      return;
    }
    moved += Math.abs(now.x - before.x) * hand.clientWidth + Math.abs(now.y - before.y) * hand.clientHeight;
    pointers.set(event.pointerId, now);
    if (moved < stillness) return;
    if (pointers.size === 1) control.pan(before.x - now.x, before.y - now.y);
    else pinch(event.pointerId, before, now);
  };

  const pinch = (id: number, before: { x: number; y: number }, now: { x: number; y: number }): void => {
    const other = [...pointers].find(([key]) => key !== id)?.[1];
    if (other === undefined) return;
    const far = Math.hypot(before.x - other.x, before.y - other.y);
    const near = Math.hypot(now.x - other.x, now.y - other.y);
    if (far > 0) control.zoom(near / far, (now.x + other.x) / 2, (now.y + other.y) / 2);
    control.pan((before.x - now.x) / 2, (before.y - now.y) / 2);
  };

  const up = (event: PointerEvent): void => {
    if (!pointers.delete(event.pointerId) || moved >= stillness || event.type === 'pointercancel') return;
    const { x, y } = share(event);
    const { pinned, cursor } = mapsStore.getState();
    const place = control.positionAt(x, y);
    const again =
      pinned && cursor?.pane === control.pane.id && cursor.row === place.row && cursor.column === place.column;
    control.point(place, !again);
  };

  const leave = (): void => {
    if (!mapsStore.getState().pinned && pointers.size === 0) control.point(null, false);
  };

  const twice = (event: MouseEvent): void => {
    const { x, y } = share(event);
    control.zoom(4, x, y);
  };

  const key = (event: KeyboardEvent): void => {
    if (event.altKey || event.metaKey || event.ctrlKey) return;
    if (!onKey(event, control, ask)) return;
    event.preventDefault();
    event.stopPropagation();
  };

  hand.addEventListener('wheel', wheel, { passive: false });
  hand.addEventListener('pointerdown', down);
  hand.addEventListener('pointermove', move);
  hand.addEventListener('pointerup', up);
  hand.addEventListener('pointercancel', up);
  hand.addEventListener('pointerleave', leave);
  hand.addEventListener('dblclick', twice);
  hand.addEventListener('keydown', key);
  return () => {
    hand.removeEventListener('wheel', wheel);
    hand.removeEventListener('pointerdown', down);
    hand.removeEventListener('pointermove', move);
    hand.removeEventListener('pointerup', up);
    hand.removeEventListener('pointercancel', up);
    hand.removeEventListener('pointerleave', leave);
    hand.removeEventListener('dblclick', twice);
    hand.removeEventListener('keydown', key);
  };
}

/** @returns whether the key meant something to the map */
function onKey(event: KeyboardEvent, control: PaneControl, ask: () => void): boolean {
  const { viewport, cursor } = mapsStore.getState();
  const { rows, columns } = control.ground;
  const here = cursor !== null && cursor.pane === control.pane.id ? cursor : control.positionAt(0.5, 0.5);
  const zoom = (factor: number): void => {
    const x = ((here.column + 0.5) / columns - viewport.left) / viewport.width;
    const y = ((here.row + 0.5) / rows - viewport.top) / viewport.height;
    const inside = x >= 0 && x <= 1 && y >= 0 && y <= 1;
    control.zoom(factor, inside ? x : 0.5, inside ? y : 0.5);
  };
  const step = (down: number, right: number): void => {
    const by = control.cellSize(viewport).columns * (event.shiftKey ? keyStep.coarse : keyStep.fine);
    const row = Math.max(0, Math.min(rows - 1, here.row + Math.round(down * Math.max(1, by))));
    const column = Math.max(0, Math.min(columns - 1, here.column + Math.round(right * Math.max(1, by))));
    control.point({ row, column }, true, true);
    if (!control.inSight({ row, column })) control.goTo({ row, column });
  };
  switch (event.key) {
    case 'ArrowUp':
      step(-1, 0);
      return true;
    case 'ArrowDown':
      step(1, 0);
      return true;
    case 'ArrowLeft':
      step(0, -1);
      return true;
    case 'ArrowRight':
      step(0, 1);
      return true;
    case '+':
    case '=':
      zoom(1.5);
      return true;
    case '-':
    case '_':
      zoom(1 / 1.5);
      return true;
    case '0':
    case 'Home':
      setViewport(everything);
      return true;
    case 'Enter':
      ask();
      return true;
    case 'Escape':
      if (cursor === null && viewport === everything) return false;
      if (cursor === null) resetMaps();
      else control.point(null, false);
      return true;
    default:
      return false;
  }
}
