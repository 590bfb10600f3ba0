import { TextLink } from '../../components/text-link.tsx'

const address = /(https?:\/\/[^\s<>"]+)/

/** The text of an e-mail as it was written; addresses of this application can be followed, others are only text. */
export function MailText({ text }: { text: string }) {
  return (
    <p className="max-w-[72ch] break-words whitespace-pre-wrap">
      {text.split(address).map((part, index) => {
        const target = address.test(part) ? ownPath(part) : null
        // The pieces of a finished text never move.
        return target === null ? (
          <span key={index}>{part}</span>
        ) : (
          <TextLink key={index} to={target}>
            {part}
          </TextLink>
        )
      })}
    </p>
  )
}

/** The path behind an address of the application, whatever host name it is known by here; null for foreign ones. */
export function ownPath(text: string, origin = window.location.origin): string | null {
  if (!URL.canParse(text)) return null
  const target = new URL(text)
  if (target.origin !== origin && !(isLoopback(target) && isLoopback(new URL(origin)))) return null
  return `${target.pathname}${target.search}${target.hash}`
}

/** localhost and 127.0.0.1 are one machine under two names. */
function isLoopback({ hostname }: URL): boolean {
  return hostname === 'localhost' || hostname === '127.0.0.1' || hostname === '[::1]'
}
