document.title = 'Armload';
