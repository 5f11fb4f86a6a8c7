import type { RouteRecordRaw } from 'vue-router';

declare module 'vue-router' {
  interface RouteMeta {
    title: string;
    /** Reached without signing in. */
    isPublic?: boolean;
    /** Drawn without the navigation. */
    isPlain?: boolean;
    isAdminOnly?: boolean;
  }
}

export const routes: RouteRecordRaw[] = [
  { path: '/', name: 'start', component: () => import('@/views/StartView.vue'), meta: { title: 'Start' } },
  {
    path: '/sign-in',
    name: 'signIn',
    component: () => import('@/views/SignInView.vue'),
    meta: { title: 'Sign in', isPublic: true, isPlain: true },
  },
  {
    path: '/forgot',
    name: 'forgot',
    component: () => import('@/views/ForgotPasswordView.vue'),
    meta: { title: 'Forgotten password', isPublic: true, isPlain: true },
  },
  {
    path: '/invitation/:token',
    name: 'invitation',
    component: () => import('@/views/SetPasswordView.vue'),
    props: (route) => ({ token: String(route.params.token), isInvitation: true }),
    meta: { title: 'Choose a password', isPublic: true, isPlain: true },
  },
  {
    path: '/reset/:token',
    name: 'reset',
    component: () => import('@/views/SetPasswordView.vue'),
    props: (route) => ({ token: String(route.params.token), isInvitation: false }),
    meta: { title: 'Choose a new password', isPublic: true, isPlain: true },
  },
  {
    path: '/projects',
    name: 'projects',
    component: () => import('@/views/ProjectListView.vue'),
    meta: { title: 'Projects' },
  },
  {
    path: '/projects/:projectId',
    name: 'project',
    component: () => import('@/views/ProjectView.vue'),
    props: true,
    meta: { title: 'Project' },
  },
  {
    path: '/projects/:projectId/settings/:tab(general|thresholds|members)?',
    name: 'projectSettings',
    component: () => import('@/views/ProjectSettingsView.vue'),
    props: true,
    meta: { title: 'Project settings' },
  },
  {
    path: '/projects/:projectId/batches/new',
    name: 'batchNew',
    component: () => import('@/views/BatchNewView.vue'),
    props: true,
    meta: { title: 'New batch' },
  },
  {
    path: '/batches/:batchId',
    name: 'batch',
    component: () => import('@/views/BatchView.vue'),
    props: true,
    meta: { title: 'Batch' },
  },
  {
    path: '/captures/:captureId',
    name: 'capture',
    component: () => import('@/views/CaptureView.vue'),
    props: true,
    meta: { title: 'Capture' },
  },
  { path: '/review', name: 'review', component: () => import('@/views/ReviewView.vue'), meta: { title: 'Review' } },
  {
    path: '/admin/users',
    name: 'adminUsers',
    component: () => import('@/views/AdminUsersView.vue'),
    meta: { title: 'Users', isAdminOnly: true },
  },
  {
    path: '/admin/mail',
    name: 'adminMail',
    component: () => import('@/views/AdminMailView.vue'),
    meta: { title: 'Mail', isAdminOnly: true },
  },
  {
    path: '/demo/mail',
    name: 'demoMail',
    component: () => import('@/views/DemoMailView.vue'),
    meta: { title: 'Caught mail' },
  },
  { path: '/account', name: 'account', component: () => import('@/views/AccountView.vue'), meta: { title: 'Account' } },
  {
    path: '/help',
    name: 'help',
    component: () => import('@/views/HelpView.vue'),
    meta: { title: 'Help', isPublic: true },
  },
  {
    path: '/help/:page',
    name: 'helpPage',
    component: () => import('@/views/HelpPageView.vue'),
    props: true,
    meta: { title: 'Help', isPublic: true },
  },
  {
    path: '/:path(.*)*',
    name: 'notFound',
    component: () => import('@/views/NotFoundView.vue'),
    meta: { title: 'Page not found' },
  },
];
