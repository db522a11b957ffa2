/* global document, localStorage */
// Before anything is painted: no flash of paper in a dim room.
document.documentElement.dataset.theme = localStorage.getItem('redpoll.theme') === 'dim' ? 'dim' : 'paper';
