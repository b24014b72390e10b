import { createRouter, createWebHistory, type Router, type RouteRecordRaw } from 'vue-router';
import { onSignedOut } from '../api/client.js';
import { useSessionStore } from '../stores/session.js';

const routes: RouteRecordRaw[] = [
  { path: '/sign-in', name: 'sign-in', component: () => import('../views/SignInView.vue'), meta: { title: 'Sign in' } },
  {
    path: '/',
    component: () => import('../layouts/MainLayout.vue'),
    children: [
      { path: '', name: 'desk', component: () => import('../views/DeskView.vue'), meta: { title: 'Desk' } },
      {
        path: 'assemblies',
        name: 'assemblies',
        component: () => import('../views/AssembliesView.vue'),
        meta: { title: 'Assemblies' },
      },
      {
        path: 'assemblies/new',
        name: 'new-assembly',
        component: () => import('../views/NewAssemblyView.vue'),
        meta: { title: 'New assembly' },
      },
      {
        path: 'assemblies/:id',
        name: 'assembly',
        component: () => import('../views/AssemblyView.vue'),
        props: true,
        meta: { title: 'Assembly' },
      },
      {
        path: 'materials/:slug?',
        name: 'materials',
        component: () => import('../views/MaterialsView.vue'),
        props: true,
        meta: { title: 'Materials' },
      },
      {
        path: 'finishes/:slug?',
        name: 'finishes',
        component: () => import('../views/FinishesView.vue'),
        props: true,
        meta: { title: 'Finishes' },
      },
      {
        path: 'parts/:slug?',
        name: 'parts',
        component: () => import('../views/PartsView.vue'),
        props: true,
        meta: { title: 'Parts' },
      },
      {
        path: 'rules/:slug?',
        name: 'rules',
        component: () => import('../views/RuleSetsView.vue'),
        props: true,
        meta: { title: 'Rule sets' },
      },
      {
        path: 'decisions',
        name: 'register',
        component: () => import('../views/RegisterView.vue'),
        meta: { title: 'Register' },
      },
      {
        path: 'decisions/:id',
        name: 'decision',
        component: () => import('../views/DecisionView.vue'),
        props: true,
        meta: { title: 'Decision' },
      },
      { path: 'team', name: 'team', component: () => import('../views/TeamView.vue'), meta: { title: 'Team' } },
      {
        path: 'account',
        name: 'account',
        component: () => import('../views/AccountView.vue'),
        meta: { title: 'Account' },
      },
      { path: 'guide', name: 'guide', component: () => import('../views/GuideView.vue'), meta: { title: 'Guide' } },
      {
        path: ':path(.*)*',
        name: 'not-found',
        component: () => import('../views/NotFoundView.vue'),
        meta: { title: 'Not found' },
      },
    ],
  },
];

export function makeRouter(): Router {
  const router = createRouter({
    history: createWebHistory(),
    routes,
    scrollBehavior: (to, from, saved) => saved ?? (to.path === from.path ? {} : { top: 0 }),
  });

  router.beforeEach(async (to) => {
    const session = useSessionStore();
    if (!session.known) {
      try {
        await session.load();
      } catch {
        // No connection yet: the sign-in page says so when it is tried.
      }
    }
    if (to.name === 'sign-in') return session.session ? { path: '/' } : true;
    return session.session ? true : { name: 'sign-in', query: { next: to.fullPath } };
  });
  router.afterEach((to) => {
    document.title = typeof to.meta.title === 'string' ? `${to.meta.title} · Trimwick` : 'Trimwick';
  });
  // A session that ends in the middle of work does not throw the work away: the layout asks for the password in place.
  onSignedOut(() => {
    useSessionStore().end();
  });
  return router;
}
