import { Link, type LinkProps } from 'react-router'

/** A link in running text or a table cell. */
export function TextLink(props: Omit<LinkProps, 'className'>) {
  return <Link {...props} className="link" />
}
