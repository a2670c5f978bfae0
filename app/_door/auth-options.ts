import type { NextAuthOptions } from 'next-auth'
import Credentials from 'next-auth/providers/credentials'
import { AppError } from '@/lib/core/errors'
import { secrets } from '@/lib/infra/secrets'
import { checkSignIn } from '@/lib/tasks/check-sign-in'

/** The token holds who and which session number; roles are read from the database on every request. */
export const authOptions = (): NextAuthOptions => ({
  secret: secrets().session,
  session: { strategy: 'jwt', maxAge: 12 * 3600 },
  pages: { signIn: '/sign-in' },
  providers: [
    Credentials({
      credentials: { account: {}, password: {} },
      async authorize(given, request) {
        const { account, password } = given ?? {}
        if (!account || !password || account.length > 200 || password.length > 400) return null
        const address = String(request.headers?.['x-forwarded-for'] ?? 'here').split(',')[0]!.trim()
        try {
          const claims = await checkSignIn({ account, password, address })
          return claims && { id: claims.userId, sessionNumber: claims.sessionNumber }
        } catch (error) {
          if (error instanceof AppError) throw new Error(error.code)
          throw error
        }
      },
    }),
  ],
  callbacks: {
    jwt: ({ token, user }) => (user ? { sub: user.id, userId: user.id, sessionNumber: user.sessionNumber } : token),
    session: ({ session, token }) => ({ expires: session.expires, userId: token.userId, sessionNumber: token.sessionNumber }),
  },
})
