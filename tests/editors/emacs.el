;;; -*- lexical-binding: t; -*-
;; Sits at Emacs as a composer does: presses keys, and writes what then stands in the buffers to the
;; file WORDS, a line a fact.  `tests/editors/emacs.rs' starts this in a terminal of tmux, with the
;; init file of the editor's own page, and judges the lines.
;;
;; The keys come through that terminal, and the editor's own main loop reads them: this is a timer
;; that looks every few milliseconds whether what it waits for has come true, and never runs a
;; command itself.

(require 'flymake)
(require 'eglot)
(require 'cl-lib)

(defconst limit 20 "Seconds for any one wait.")
(defconst faulty-row 6 "The row that is mended, counted from 1.")
(defvar sheet nil "The sheet's buffer.")
(defvar steps nil "What is still to be done: functions; the first is called until it gives non-nil.")
(defvar since nil "When the first of them was called first.")
(defvar before nil "Where `remember' keeps what a later step compares with.")

(defun tell (format &rest values)
  (write-region (concat (apply #'format format values) "\n") nil (getenv "WORDS") t 'quiet))

(defun screen ()
  (with-temp-buffer
    (call-process "tmux" nil t nil "capture-pane" "-p" "-t" (getenv "TMUX_PANE"))
    (string-trim (buffer-string))))

(defun fail (format &rest values)
  (apply #'tell (concat "FAILED: " format) values)
  (tell "-- the screen\n%s" (screen))
  (tell "-- the messages\n%s" (with-current-buffer (messages-buffer) (buffer-string)))
  (let ((kill-emacs-hook nil))
    (kill-emacs 1)))

(defun tick ()
  (condition-case trouble
      (when steps
        (setq since (or since (float-time)))
        (when (with-current-buffer (or sheet (current-buffer))
                (funcall (car steps)))
          (setq steps (cdr steps)
                since nil)))
    (error (fail "%s" (error-message-string trouble)))))

(defmacro composer (&rest forms)
  "Do FORMS one after the other, each once; a `wait' until it comes true."
  `(setq steps (append steps (list ,@(mapcar (lambda (form)
                                               (if (memq (car form) '(wait))
                                                   `(lambda () ,form)
                                                 `(lambda () ,form t)))
                                             forms)))))

(defmacro wait (what form)
  `(or ,form
       (and (> (- (float-time) since) limit) (fail "waited in vain for %s" ,what))))

(defun press (&rest keys)
  "Press KEYS in the terminal: key names of tmux, and whole words to be typed."
  (tell "typed %s" (string-join keys " "))
  (dolist (key keys)
    (unless (zerop (if (string-match-p "\\`\\(?:[CM]-.\\|Enter\\|Tab\\)\\'" key)
                       (call-process "tmux" nil nil nil "send-keys" "-t" (getenv "TMUX_PANE") key)
                     (call-process "tmux" nil nil nil "send-keys" "-t" (getenv "TMUX_PANE") "-l" key)))
      (fail "tmux did not take %s" key))))

(defun tell-changes ()
  "Tell the lines that were not there `before'."
  (let ((old (split-string before "\n")))
    (dolist (line (split-string (buffer-string) "\n"))
      (unless (member line old)
        (tell "changed %s" (substring-no-properties line))))))

(defun findings ()
  (sort (flymake-diagnostics)
        (lambda (a b) (< (flymake-diagnostic-beg a) (flymake-diagnostic-beg b)))))

;; The version of the sheet on which the server's last word was; a word on no version is one too many.
(defvar heard nil)
(cl-defmethod eglot-handle-notification :after
  (_server (_method (eql textDocument/publishDiagnostics)) &key version &allow-other-keys)
  (setq heard (or version (fail "the server has spoken of no version"))))

(defun found (count)
  "Whether the server has had its say on the text as it is, and COUNT findings are shown."
  (and (null eglot--recent-changes)
       (eql heard eglot--versioned-identifier)
       (= count (length (findings)))))

(defun tell-findings ()
  (tell "findings %d" (length (findings)))
  (dolist (it (findings))
    (save-excursion
      (goto-char (flymake-diagnostic-beg it))
      (tell "finding %d:%d \"%s\" %s"
            (line-number-at-pos) (1+ (current-column))
            (buffer-substring-no-properties (point) (flymake-diagnostic-end it))
            (flymake-diagnostic-type it)))
    (tell "message %s" (flymake-diagnostic-text it))))

(defun at-prompt (words)
  "Whether the minibuffer asks with WORDS."
  (when (active-minibuffer-window)
    (with-current-buffer (window-buffer (active-minibuffer-window))
      (string-match-p words (minibuffer-prompt)))))

(defun tell-choices ()
  (with-current-buffer (window-buffer (active-minibuffer-window))
    (dolist (choice (all-completions "" minibuffer-completion-table))
      (tell "choice %s" (substring-no-properties choice)))))

;; It kills its server as soon as that has answered, so no exit status tells how that went.
(advice-add 'jsonrpc-request :around
            (lambda (request server method &rest more)
              (let ((answer (apply request server method more)))
                (when (eq method :shutdown)
                  (tell "shutdown answered with %S" answer))
                answer)))

(defun server-process ()
  (jsonrpc--process (eglot-current-server)))

(composer
 (wait "the sheet" (setq sheet (get-buffer "quay-lamps.voices")))
 (tell "mode %s, comment %s" major-mode comment-start)
 (wait "the server" (eglot-current-server))
 (tell "server %s" (string-join (process-command (server-process)) " "))
 (tell "language %s" (eglot--language-id (eglot-current-server)))
 (wait "the first word" (found 1))
 (tell-findings)

 ;; A mend, by the editor's own command and the first that it offers.
 (press "M-x" "flymake-goto-next-error" "Enter")
 (wait "the cursor at the finding" (= (line-number-at-pos (window-point (get-buffer-window sheet))) faulty-row))
 (wait "the message in the echo area" (and (current-message) (string-match-p "arallel fifths" (current-message))))
 (press "M-x" "eglot-code-actions" "Enter")
 (wait "the choice" (at-prompt "Pick an action"))
 (tell-choices)
 (setq before (buffer-string))
 (press "Enter")
 (wait "the text to change" (not (equal before (buffer-string))))
 (wait "the finding to go" (found 0))
 (tell-changes)
 (tell-findings)

 ;; It was meant: back, and a licence for it.
 (press "C-_")
 (wait "the text as it was" (equal before (buffer-string)))
 (wait "the finding to come again" (found 1))
 (press "M-x" "flymake-goto-next-error" "Enter")
 (wait "the cursor at the finding" (= (line-number-at-pos (window-point (get-buffer-window sheet))) faulty-row))
 (press "M-x" "eglot-code-actions" "Enter")
 (wait "the choice" (at-prompt "Pick an action"))
 (press "Grant" "Tab" "Enter")
 (wait "the text to change" (not (equal before (buffer-string))))
 (wait "the finding to go" (found 0))
 (tell-changes)
 (tell-findings)

 (tell "comments %s" (save-excursion
                       (goto-char (point-min))
                       (search-forward "lamps are lit")
                       (syntax-propertize (point-max))
                       (and (nth 4 (syntax-ppss)) (eq 'font-lock-comment-face (get-text-property (point) 'face)))))

 (setq before (buffer-string))
 (press "M-x" "eglot-format-buffer" "Enter")
 (wait "the text to change" (not (equal before (buffer-string))))
 (wait "the server's word" (found 0))
 (tell-changes)

 (setq before (server-process))
 (tell "process %s" (process-id before))
 (press "C-x" "C-s")
 (wait "the file to be written" (not (buffer-modified-p)))
 (press "M-x" "eglot-shutdown" "Enter")
 (wait "the server to end" (not (process-live-p before)))
 (wait "the editor to know" (not (eglot-managed-p)))
 (tell "findings %d" (length (findings)))

 ;; Once more, to leave by the door: the server must go when the editor does.
 (setq heard nil)
 (press "M-x" "eglot" "Enter")
 (wait "the server again" (eglot-current-server))
 (wait "its first word" (found 0))
 (tell "process %s" (process-id (server-process)))
 (press "C-x" "C-c"))

(run-with-timer 0 0.01 #'tick)
