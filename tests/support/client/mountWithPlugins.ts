import { QueryClient, VueQueryPlugin } from '@tanstack/vue-query';
import { mount } from '@vue/test-utils';
import { createPinia } from 'pinia';
import type { Component } from 'vue';
import { createMemoryHistory, createRouter } from 'vue-router';
import { vuetify } from '@/plugins/vuetify';
import { routes } from '@/router/routes';
import { withoutPages } from './withoutPages';

interface MountOptions {
  props?: Record<string, unknown>;
  slots?: Record<string, string>;
}

/** Mounts a component as the application does: the real theme, a store, queries that do not retry, the real routes. */
export function mountWithPlugins(component: Component, { props = {}, slots = {} }: MountOptions = {}) {
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const router = createRouter({ history: createMemoryHistory(), routes: withoutPages(routes) });
  return mount(component, {
    props,
    slots,
    attachTo: document.body,
    global: { plugins: [vuetify, createPinia(), [VueQueryPlugin, { queryClient }], router] },
  });
}
