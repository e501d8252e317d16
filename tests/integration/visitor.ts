import { GET as authGet, POST as authPost } from '@/app/api/auth/[...all]/route'
import { type Context, contextFrom } from '@/lib/auth/context'
import { newAddress, tokenMailedTo } from './post-box'

export const origin = 'http://127.0.0.1:3000'
export const password = 'a long enough one'

/** Somebody with a browser: keeps cookies between calls of the doors of better-auth, as a browser would. */
export class Visitor {
  private readonly jar = new Map<string, string>()

  get cookie(): string {
    return [...this.jar].map(([name, value]) => `${name}=${value}`).join('; ')
  }

  async post(path: string, body: unknown = {}, headers: Record<string, string> = {}): Promise<Response> {
    const request = new Request(`${origin}/api/auth${path}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', origin, cookie: this.cookie, ...headers },
      body: JSON.stringify(body),
    })
    return this.keep(await authPost(request))
  }

  async get(path: string): Promise<Response> {
    return this.keep(await authGet(new Request(`${origin}/api/auth${path}`, { headers: { cookie: this.cookie } })))
  }

  signUp = (email: string, name = 'Ada', secret = password) =>
    this.post('/sign-up/email', { name, email, password: secret })
  signIn = (email: string, secret = password) => this.post('/sign-in/email', { email, password: secret })
  confirm = (token: string) => this.get(`/verify-email?token=${token}`)
  context = (): Promise<Context> => contextFrom(new Headers({ cookie: this.cookie }))
  isSignedIn = async () => (await this.context()).userId !== null

  private keep(response: Response): Response {
    for (const line of response.headers.getSetCookie()) {
      const [pair = '', ...attributes] = line.split(';')
      const at = pair.indexOf('=')
      const [name, value] = [pair.slice(0, at), pair.slice(at + 1)]
      const isGone = value === '' || attributes.some((attribute) => /^\s*max-age=0$/i.test(attribute))
      if (isGone) this.jar.delete(name)
      else this.jar.set(name, value)
    }
    return response
  }
}

/** Somebody with a confirmed address who is signed in. */
export async function signedUp(name = 'Ada', email = newAddress()): Promise<{ email: string; at: Visitor }> {
  const at = new Visitor()
  await at.signUp(email, name)
  await at.confirm(await tokenMailedTo(email))
  await at.signIn(email)
  if (!(await at.isSignedIn())) throw new Error(`${email} could not sign in`)
  return { email, at }
}

export const codeFrom = async (response: Response): Promise<string> =>
  ((await response.clone().json()) as { code?: string }).code ?? ''
