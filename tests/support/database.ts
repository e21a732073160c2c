import type { TestProject } from 'vitest/node'
import { startThrowawayCluster } from '../../server/scripts/throwaway-cluster.mjs'
import { migrate } from '../../server/migrate.ts'

/** The addresses of the template database for the cluster's three roles. */
export interface ClusterUrls {
  superuser: string
  owner: string
  application: string
}

declare module 'vitest' {
  export interface ProvidedContext {
    cluster: ClusterUrls
  }
}

let shared: Promise<{ urls: ClusterUrls; stop: () => Promise<void> }> | undefined
let users = 0

/**
 * Starts one throwaway cluster for the whole run of the tests and migrates its database once; it is the template that every test
 * file gets its own copy of (test-database.ts). Both projects that need it share it.
 */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  users += 1
  shared ??= start()
  const { urls, stop } = await shared
  project.provide('cluster', urls)
  return async () => {
    users -= 1
    if (users > 0) return
    shared = undefined
    await stop()
  }
}

async function start() {
  const cluster = await startThrowawayCluster()
  const urls = cluster.urls()
  try {
    await migrate(urls.owner, new URL(urls.application).username)
  } catch (error) {
    await cluster.stop()
    throw error
  }
  return { urls, stop: cluster.stop }
}
