;;; suite.el --- what Emacs' own client does with the server, as a user's set-up starts it  -*- lexical-binding: t -*-
(require 'cl-lib)
(require 'flymake)
(require 'imenu)
(require 'xref)

(defvar suite-passed 0)
(defvar suite-failed 0)

(defmacro suite-test (name &rest body)
  "Runs BODY and tells whether NAME holds."
  (declare (indent 1))
  `(condition-case why
       (progn ,@body
              (cl-incf suite-passed)
              (princ (format "  ok    %s\n" ,name)))
     (error (cl-incf suite-failed)
            (princ (format "  FAIL  %s\n        %s\n" ,name (error-message-string why))))))

(defun suite-eventually (what check)
  "Waits for what comes in its own time, and gives what CHECK gives."
  (let ((until (time-add (current-time) 20)) seen)
    (while (not (or (setq seen (funcall check)) (time-less-p until (current-time))))
      (accept-process-output nil 0.05))
    (or seen (error "Waited for %s" what))))

(defun suite-open (name)
  "Visits the note NAME with a server that manages it."
  (switch-to-buffer (find-file-noselect name))
  ;; Without a keyboard nothing runs what waits for the next command.
  (run-hooks 'post-command-hook)
  (suite-eventually "the server" (lambda () (eglot-managed-p)))
  (flymake-start)
  (current-buffer))

(defun suite-tell-server ()
  "Sends what was changed: an idle timer does it where somebody sits at the keyboard."
  (eglot--signal-textDocument/didChange))

(defun suite-texts ()
  (mapcar #'flymake-diagnostic-text (flymake-diagnostics)))

(defun suite-told (part)
  "The finding whose text holds PART, if it is told."
  (cl-find-if (lambda (one) (string-match-p (regexp-quote part) (flymake-diagnostic-text one)))
              (flymake-diagnostics)))

(defun suite-place (text &optional into)
  "Puts point on TEXT, INTO characters further."
  (goto-char (point-min))
  (search-forward text)
  (goto-char (+ (match-beginning 0) (or into 0))))

;; The README's own set-up.
(load (getenv "PLUMBLINE_SETUP") nil t)

(suite-test "the findings of a note are pushed"
  (suite-open "winter-shuttle.plumb")
  (suite-eventually "the bank over its limit" (lambda () (suite-told "Bank 32")))
  (unless (suite-told "132 kt") (error "%S" (suite-texts))))

(suite-test "a hover shows the result"
  (suite-open "winter-shuttle.plumb")
  (suite-place "bank 32" 6)
  (let (told)
    (eglot-hover-eldoc-function (lambda (text &rest _) (setq told text)))
    (suite-eventually "the hover" (lambda () told))
    (unless (string-match-p "warning.bank [0-9]+°" told) (error "%s" told))))

(suite-test "completion offers the card's configurations"
  (suite-open "winter-shuttle.plumb")
  (suite-place "config flaps-5" 7)
  (let* ((found (eglot-completion-at-point))
         (labels (all-completions "" (nth 2 found))))
    (unless (member "flaps-30" labels) (error "%S" labels))))

(suite-test "the definition of an aeroplane is its card in another file"
  (suite-open "winter-shuttle.plumb")
  (suite-place "fly brambling-37" 6)
  (let* ((found (xref-backend-definitions 'eglot (xref-backend-identifier-at-point 'eglot)))
         (file (xref-location-group (xref-item-location (car found)))))
    (unless (string-suffix-p "aeroplanes.plumb" file) (error "%s" file))))

(suite-test "a code action mends a stale claim, and the finding goes"
  (suite-open "winter-shuttle.plumb")
  (suite-place "claim stall 132 kt")
  (suite-eventually "the stale claim" (lambda () (suite-told "132 kt")))
  (let ((fix (cl-find-if (lambda (one) (string-match-p "^Write [0-9]+ kt$" (plist-get one :title)))
                         (append (eglot-code-actions (point) (line-end-position)) nil))))
    (unless fix (error "No fix is offered"))
    (eglot--apply-workspace-edit (plist-get fix :edit)))
  (goto-char (point-min))
  (when (search-forward "claim stall 132" nil t) (error "The claim stays as it was"))
  (suite-tell-server)
  (suite-eventually "the finding to go" (lambda () (not (suite-told "132 kt")))))

(suite-test "what is typed is checked, also behind letters of many bytes"
  (suite-open "winter-shuttle.plumb")
  (goto-char (point-max))
  (insert "\n| phase hold \"Größe 🛩 漢\"; weight 5\n")
  (suite-tell-server)
  (let ((found (suite-eventually "the missing unit" (lambda () (suite-told "5 of what?")))))
    (unless (eq ?5 (char-after (flymake-diagnostic-beg found)))
      (error "It stands at %d" (flymake-diagnostic-beg found)))))

(suite-test "formatting lays out the bar lines"
  (suite-open "steep-turns.plumb")
  (suite-place "| fly gorsechat-2")
  (delete-region (point) (line-end-position))
  (insert "|fly gorsechat-2 ;under school-rules;rules vfr")
  (eglot-format-buffer)
  (suite-tell-server)
  (goto-char (point-min))
  (unless (search-forward "\n| fly gorsechat-2; under school-rules; rules vfr\n" nil t)
    (error "%s" (buffer-string))))

(suite-test "the outline is there"
  (suite-open "winter-shuttle.plumb")
  (let ((outline (format "%S" (eglot-imenu))))
    (unless (string-match-p "Noise turn" outline) (error "%s" outline))))

(suite-test "a card is renamed in every note of the folder"
  (suite-open "aeroplanes.plumb")
  (suite-place "aircraft gorsechat-2" 10)
  (cl-letf (((symbol-function 'y-or-n-p) #'always))
    (eglot-rename "gorsechat-3"))
  (dolist (name '("aeroplanes.plumb" "steep-turns.plumb"))
    (with-current-buffer (find-file-noselect name)
      (when (string-match-p "gorsechat-2" (buffer-string)) (error "%s keeps the old name" name)))))

(princ (format "emacs: %d passed, %d failed\n" suite-passed suite-failed))
(kill-emacs (if (zerop suite-failed) 0 1))
;;; suite.el ends here
