;;; voicesheet-mode.el --- Voice parts typed as text, checked by partwright  -*- lexical-binding: t; -*-

;; Version: 0.1.0
;; Package-Requires: ((emacs "28.1") (eglot "1.9"))
;; Keywords: languages

;;; Commentary:

;; A major mode for voice sheets (.voices), and the server that eglot starts for it.

;;; Code:

(defvar voicesheet-mode-syntax-table
  (let ((table (make-syntax-table)))
    ;; A note with its signs is one word: `M-f' steps from note to note, `M-d' takes a whole one.
    (dolist (sign '(?# ?♯ ?♭ ?♮ ?𝄪 ?𝄫))
      (modify-syntax-entry sign "w" table))
    (modify-syntax-entry ?\" "." table)
    (modify-syntax-entry ?\n ">" table)
    table))

(defconst voicesheet--comments
  (syntax-propertize-rules ("\\(?:^\\|[[:space:]]\\)\\(/\\)/" (1 "<")))
  "Two strokes start a comment, at a line's start or after white space.")

(defconst voicesheet--words
  (list
   (cons (concat "^[[:blank:]]*"
                 (regexp-opt '("sheet" "title" "subtitle" "by" "style" "key" "metre" "meter" "tempo"
                               "equal" "licence" "license" "voice" "words" "harmony" "figures")
                             'words))
         'font-lock-keyword-face)
   '("^[[:blank:]]*\\([[:alpha:]][[:alnum:]]*\\)[[:blank:]]*|" 1 font-lock-variable-name-face)
   '("\\*[[:alpha:]]+" . font-lock-constant-face))
  "Headers, labels, footnote marks: the music itself stays as it is.")

;;;###autoload
(define-derived-mode voicesheet-mode prog-mode "Voices"
  "Voice parts typed as text."
  (setq-local comment-start "// "
              comment-start-skip "//+[[:blank:]]*"
              syntax-propertize-function voicesheet--comments
              font-lock-defaults '(voicesheet--words)
              ;; A row's columns are the music: neither broken nor moved.
              truncate-lines t
              indent-line-function #'ignore
              electric-indent-inhibit t))

;;;###autoload
(add-to-list 'auto-mode-alist '("\\.voices\\'" . voicesheet-mode))

;; eglot makes the language id of the mode's name: voicesheet.
(defvar eglot-server-programs)
(with-eval-after-load 'eglot
  (add-to-list 'eglot-server-programs '(voicesheet-mode "partwright" "serve")))

(provide 'voicesheet-mode)

;;; voicesheet-mode.el ends here
