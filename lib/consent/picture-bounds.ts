/** No page needs more; a small file that unpacks to more is made to exhaust whoever opens it. */
export const sidePxMost = 12_000;
export const pixelsMost = 40_000_000;

/** Whether a picture's size is one that a photograph or a scan of a form has. */
export const fitsBounds = (width: number, height: number): boolean => width >= 1 && height >= 1 && width <= sidePxMost && height <= sidePxMost && width * height <= pixelsMost;
