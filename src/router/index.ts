import { createRouter, createWebHistory, type Router } from 'vue-router';
import { sections } from './sections';

/** Each view is loaded when it is first wanted. */
export function createAppRouter(): Router {
  return createRouter({
    history: createWebHistory(),
    scrollBehavior: (_to, _from, kept) => kept ?? { top: 0 },
    routes: [
      { path: '/', name: 'start', component: () => import('../views/StartView.vue') },
      { path: '/account', name: 'account', component: () => import('../views/AccountView.vue') },
      { path: '/invitation/:token', name: 'invitation', component: () => import('../views/InvitationView.vue') },
      {
        path: '/p/:id',
        component: () => import('../views/ProductionView.vue'),
        redirect: (to) => ({ name: sections[0].name, params: to.params }),
        children: [
          { path: 'production', name: 'production', component: () => import('../views/AboutView.vue') },
          { path: 'songs', name: 'songs', component: () => import('../views/SongsView.vue') },
          { path: 'people', name: 'people', component: () => import('../views/PeopleView.vue') },
          { path: 'rooms', name: 'rooms', component: () => import('../views/RoomsView.vue') },
          { path: 'plan', name: 'plan', component: () => import('../views/PlanView.vue') },
          { path: 'sheets', name: 'sheets', component: () => import('../views/SheetsView.vue') },
        ],
      },
      { path: '/:missing(.*)*', name: 'missing', component: () => import('../views/MissingView.vue') },
    ],
  });
}
