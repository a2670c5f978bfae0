import 'next-auth'
import 'next-auth/jwt'

declare module 'next-auth' {
  interface Session { userId?: string; sessionNumber?: number }
  interface User { sessionNumber?: number }
}
declare module 'next-auth/jwt' {
  interface JWT { userId?: string; sessionNumber?: number }
}
