'use client'

/** As the root's, but inside the team's frame, so that the rail stays. */
export { default } from '@/app/error'
