/** The only two ways between the page and this program; the preload and the host share these names. */
export const callChannel = 'ohmwright:call';
export const eventChannel = 'ohmwright:event';
/** How the host tells the preload the name of its window, among the arguments of the page's process. */
export const windowArgument = '--ohmwright-window=';
