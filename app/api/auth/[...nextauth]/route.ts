import NextAuth from 'next-auth'
import { authOptions } from '@/app/_door/auth-options'

const handler = (request: Request, context: unknown) => NextAuth(authOptions())(request, context) as Promise<Response>
export { handler as GET, handler as POST }
