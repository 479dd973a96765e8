/** What an entry of the palette carries while it is dragged: the fields of a part as JSON. */
export const DRAGGED_PART = 'application/x-ohmwright-part';
