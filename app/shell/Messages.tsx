// Messages over the page, under the top bar: what was open stays as it was and in view.
import './Messages.css'
import { dismiss, useMessages } from './messages.ts'

const SHOWN_LINES = 6

export function Messages() {
  const messages = useMessages((s) => s.messages)
  return (
    <section className="cw-messages" aria-label="Messages">
      {messages.map((message) => (
        <div key={message.id} className="cw-message" data-kind={message.kind} role="alert">
          <div className="cw-message-text">
            <p className="cw-message-title">
              <span aria-hidden="true">{message.kind === 'refusal' ? '■ ' : '· '}</span>
              {message.title}
            </p>
            {message.lines.length > 0 && (
              <ul>
                {message.lines.slice(0, SHOWN_LINES).map((line) => (
                  <li key={line}>{line}</li>
                ))}
                {message.lines.length > SHOWN_LINES && <li>and {message.lines.length - SHOWN_LINES} more</li>}
              </ul>
            )}
          </div>
          <button type="button" className="cw-button" onClick={() => dismiss(message.id)}>
            Dismiss
          </button>
        </div>
      ))}
    </section>
  )
}
