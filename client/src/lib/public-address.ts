/** The address under which the installation is reached, as the server has written it into the page; without a server, where the page came from. */
export const publicAddress = (): string => document.documentElement.dataset.address || window.location.origin
