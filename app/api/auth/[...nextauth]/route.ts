import { nextAuthRoute } from '@/lib/server/next-auth-route';

export { nextAuthRoute as GET, nextAuthRoute as POST };
