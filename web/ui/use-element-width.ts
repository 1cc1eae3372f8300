import { useLayoutEffect, useState } from "react";

/**
 * Follows the width of an element's content box.
 *
 * @returns a ref callback's target setter and the width in pixels, null before the first layout
 */
export function useElementWidth(): [(element: Element | null) => void, number | null] {
  const [element, setElement] = useState<Element | null>(null);
  const [width, setWidth] = useState<number | null>(null);
  useLayoutEffect(() => {
    if (element === null) return;
    const measure = () => setWidth(element.clientWidth);
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, [element]);
  return [setElement, width];
}
