// Which channel a picture shows, where they differ: a toggle in the plot's head.

export interface ChannelChoice {
  /** Shows the button when there is a second channel of its own. */
  offer(differs: boolean): void
  destroy(): void
}

export function channelButton(element: HTMLElement, onChoose: (second: boolean) => void): ChannelChoice {
  const button = document.createElement('button')
  button.type = 'button'
  button.className = 'cw-button cw-map-channel'
  button.textContent = 'Second channel'
  button.hidden = true
  button.setAttribute('aria-pressed', 'false')
  const press = (second: boolean) => {
    button.setAttribute('aria-pressed', String(second))
    onChoose(second)
  }
  button.addEventListener('click', () => press(button.getAttribute('aria-pressed') !== 'true'))
  element.append(button)
  return {
    offer(differs) {
      button.hidden = !differs
      if (!differs) button.setAttribute('aria-pressed', 'false')
    },
    destroy: () => button.remove(),
  }
}
