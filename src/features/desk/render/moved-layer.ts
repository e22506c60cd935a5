/**
 * Moves an element over the sheet by the transforms it is told. It is moved by an animation that stands still, since a
 * transform in the element's style makes the browser lay all layers of the page out anew, which with software rendering
 * takes 2 to 3 ms of every frame in which something moves; that of an animation is handed to the compositor as it is.
 */
export function movedLayer(element: Element): (transform: string) => void {
  const movement = new KeyframeEffect(element, null, { duration: 1, fill: 'both' });
  new Animation(movement, element.ownerDocument.timeline).pause();
  let told = '';
  return (transform) => {
    if (transform === told) return;
    told = transform;
    movement.setKeyframes({ transform: [transform, transform] });
  };
}
