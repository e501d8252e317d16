import { emailProblem } from '@/components/front/sign-words'

/** More than anybody types; a whole company is invited in several goes. */
export const mostAddresses = 50

/** Addresses as typed or pasted: by line, comma, semicolon or space; "Ada <ada@x.example>" too. Each once. */
export function addressesIn(text: string): string[] {
  const inBrackets = text.replace(/[^,;\n<]*<([^<>\s]+)>/g, ' $1 ')
  const found = inBrackets.split(/[\s,;]+/).filter((piece) => piece !== '')
  return [...new Set(found.map((address) => address.toLowerCase()))]
}

/** What is wrong with a list of addresses, as a sentence; undefined when nothing is. */
export function addressesProblem(addresses: readonly string[]): string | undefined {
  if (addresses.length === 0) return 'Type an e-mail address.'
  if (addresses.length > mostAddresses)
    return `These are ${addresses.length} addresses. Invite ${mostAddresses} at a time.`
  const wrong = addresses.filter((address) => emailProblem(address) !== undefined)
  if (wrong.length === 0) return undefined
  return wrong.length === 1
    ? `${wrong[0]} is not an e-mail address. It looks like name@company.com.`
    : `These are not e-mail addresses: ${wrong.join(', ')}.`
}
