/** The top bar: its menus open inside it, so that they belong to its landmark. */
export const topBarElement: { current: HTMLElement | null } = { current: null }
