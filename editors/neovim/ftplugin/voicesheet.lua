-- A row is long and its columns are the music, so it is neither broken nor wrapped; and a note
-- with its sign is one word, so that `w` steps from note to note and `cw` changes a whole one.
vim.bo.commentstring = '// %s'
vim.bo.comments = '://'
vim.opt_local.formatoptions:remove('t')
vim.opt_local.iskeyword:append('#')
vim.wo[0][0].wrap = false

vim.b.undo_ftplugin = (vim.b.undo_ftplugin and vim.b.undo_ftplugin .. ' | ' or '')
  .. 'setlocal commentstring< comments< formatoptions< iskeyword< wrap<'
