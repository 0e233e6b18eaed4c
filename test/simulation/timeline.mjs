// What will happen, in order of business time; what is added for the same instant keeps its order.

export class Timeline {
  #heap = [];
  #added = 0;

  add(at, run) {
    this.#added += 1;
    this.#heap.push({ at, order: this.#added, run });
    let index = this.#heap.length - 1;
    while (index > 0) {
      const parent = (index - 1) >> 1;
      if (!before(this.#heap[index], this.#heap[parent])) break;
      this.#swap(index, parent);
      index = parent;
    }
  }

  get nextAt() {
    return this.#heap[0]?.at ?? null;
  }

  take() {
    const first = this.#heap[0];
    const last = this.#heap.pop();
    if (this.#heap.length > 0) {
      this.#heap[0] = last;
      let index = 0;
      for (;;) {
        const [left, right] = [2 * index + 1, 2 * index + 2];
        let least = index;
        if (left < this.#heap.length && before(this.#heap[left], this.#heap[least])) least = left;
        if (right < this.#heap.length && before(this.#heap[right], this.#heap[least]))
          least = right;
        if (least === index) break;
        this.#swap(index, least);
        index = least;
      }
    }
    return first;
  }

  #swap(one, other) {
    [this.#heap[one], this.#heap[other]] = [this.#heap[other], this.#heap[one]];
  }
}

const before = (one, other) =>
  one.at < other.at || (one.at === other.at && one.order < other.order);
